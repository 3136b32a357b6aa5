import { Button } from '@fluentui/react-components';
import type { Notice } from '@hubtack/contracts/notices/notice.js';
import { useQuery } from '@tanstack/react-query';
import { useEffect, useRef, useState } from 'react';
import { Link } from 'react-router-dom';
import { clockTime, utc } from '../../lib/format';
import { noticesQuery, useNoticesSeen } from '../../lib/notices';
import { useMe } from '../../lib/session';
import { tellOnDevice } from './device';
import './notices.css';

/** One that came this long ago is read, not sounded: the page was closed or cut off meanwhile. */
const FRESH_MS = 60_000;

/** New notices are told once each, assertively; all can be read again here. */
export default function NoticeBell() {
  const { timeZone } = useMe();
  const notices = useQuery(noticesQuery).data;
  const seen = useNoticesSeen();
  const words = useNewNotices(notices);
  const unseen = notices?.filter(({ seenAt }) => seenAt === null).length ?? 0;
  const newest = notices?.[0];
  return (
    <div className="notice-bell">
      <p className="visually-hidden" aria-live="assertive">
        {words}
      </p>
      <button type="button" className="user-menu-button" popoverTarget="notices">
        Notices{unseen > 0 && <span className="nav-count">{unseen}</span>}
      </button>
      <div id="notices" popover="auto" className="notice-sheet">
        {notices?.length === 0 && <p>Nothing was told yet.</p>}
        <ul>
          {notices?.slice(0, 20).map(({ id, at, text, lostFixId, seenAt }) => (
            <li key={id} data-seen={seenAt !== null}>
              <Link to={`/lost-fixes/${lostFixId}`}>{text}</Link>{' '}
              <time title={utc(at)}>{clockTime(at, timeZone)}</time>
            </li>
          ))}
        </ul>
        <div className="lost-fix-actions">
          {unseen > 0 && newest && <Button onClick={() => seen.mutate(newest.id)}>All seen</Button>}
          <Link to="/notices">What I am told of</Link>
        </div>
      </div>
    </div>
  );
}

/** Words of what has come since the page is open. */
function useNewNotices(notices: readonly Notice[] | undefined): string {
  const known = useRef<Set<number> | null>(null);
  const [words, setWords] = useState('');
  useEffect(() => {
    if (!notices) return;
    const before = known.current;
    known.current = new Set(notices.map(({ id }) => id));
    if (!before) return;
    const fresh = notices.filter(({ id, at }) => !before.has(id) && Date.now() - at < FRESH_MS);
    for (const { text, ways } of fresh) tellOnDevice(text, ways);
    if (fresh.length > 0) setWords(fresh.map(({ text }) => text).join(' '));
  }, [notices]);
  return words;
}
