import { causeLabels } from '@hubtack/contracts/lost-fixes/cause.js';
import { flagLabels, type LostFixDetail } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { useQuery } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { Link, useParams } from 'react-router-dom';
import { Failed, Loading } from '../../components/query-states';
import { useServerNow } from '../../live/use-lanes';
import { clockTime, duration, utc } from '../../lib/format';
import { lostFixQuery } from '../../lib/lost-fixes';
import { useMe } from '../../lib/session';
import { AnswerPart } from './answer-part';
import { DiagnosisPart } from './diagnosis-part';
import { HistoryList } from './history-list';
import { KindMark } from './kind-mark';
import { LossCharts } from './loss-charts';
import { LostFixRow } from './lost-fix-row';
import { NearestList } from './nearest-list';
import { lengthMs } from './order';
import { PhotoStrip } from './photo-strip';
import './lost-fixes.css';

export default function LostFixPage() {
  const { id } = useParams();
  const { data, error, refetch } = useQuery(lostFixQuery(Number(id)));
  if (error && !data) return <Failed error={error} retry={() => void refetch()} />;
  if (!data) return <Loading what="the lost fix" />;
  return <Detail key={data.id} lostFix={data} />;
}

function Detail({ lostFix }: { lostFix: LostFixDetail }) {
  const { role, timeZone } = useMe();
  const mayAnswer = role !== 'crewChief' && role !== 'display';
  const { kind, flag, closed, memberList, photoList, history } = lostFix;
  const name = kind === 'mountPoint' ? lostFix.mountPoint : (lostFix.crewName ?? 'No crew');
  useEffect(() => {
    document.title = `${name} – Hubtack`;
    return () => {
      document.title = 'Hubtack';
    };
  }, [name]);
  return (
    <article className="loss">
      {mayAnswer && (
        <p className="loss-back">
          <Link to="/lost-fixes">All lost fixes</Link>
        </p>
      )}
      <header className="loss-head">
        <KindMark lostFix={lostFix} />
        <h1>
          {name} <small>{[lostFix.roverLabel, lostFix.siteName].filter(Boolean).join(', ')}</small>
        </h1>
        <Since lostFix={lostFix} />
      </header>
      <div className="loss-columns">
        <div>
          {flag && (
            <p className="loss-flag">
              <strong>{flagLabels[flag.word]}</strong>
              {flag.note && `: ${flag.note}`}{' '}
              <small title={utc(flag.at)}>
                {flag.by}, {clockTime(flag.at, timeZone)}
              </small>
            </p>
          )}
          {closed && (
            <p className="loss-flag">
              Closed by {closed.by} as <strong>{causeLabels[closed.cause].toLowerCase()}</strong>
              {closed.note && `: ${closed.note}`}
            </p>
          )}
          {kind !== 'flag' && <DiagnosisPart lostFix={lostFix} />}
          {mayAnswer && !closed && <AnswerPart lostFix={lostFix} />}
          <PhotoStrip lostFixId={lostFix.id} photos={photoList} />
          <HistoryList history={history} zone={timeZone} />
        </div>
        <div>
          {lostFix.roverId !== null && <LossCharts lostFix={lostFix} roverId={lostFix.roverId} />}
          {memberList.length > 0 && (
            <section>
              <h2>Under it</h2>
              <ul className="desk">
                {memberList.map((member) => (
                  <LostFixRow key={member.id} lostFix={member} members={[]} />
                ))}
              </ul>
            </section>
          )}
          <NearestList lostFix={lostFix} />
          {mayAnswer && <Histories lostFix={lostFix} />}
        </div>
      </div>
      <p className="caution">
        Fixed is the receiver’s own claim: check into known control before and during work. This board does
        not say that anybody is safe: for a quiet rover call the crew; the firm’s lone-work rule comes first.
      </p>
    </article>
  );
}

function Since({ lostFix }: { lostFix: LostFixDetail }) {
  const now = useServerNow();
  const { timeZone } = useMe();
  const [phone] = useState(() => lostFix.crewPhone?.replace(/[^+\d]/g, ''));
  const { startAt, endAt, pausedMs, sharedId } = lostFix;
  return (
    <p className="loss-since">
      <strong>{duration(lengthMs(lostFix, now))}</strong>{' '}
      <span title={utc(startAt)}>
        {endAt === null
          ? `since ${clockTime(startAt, timeZone)}`
          : `from ${clockTime(startAt, timeZone)} to ${clockTime(endAt, timeZone)}`}
      </span>
      {pausedMs > 0 && `, ${duration(pausedMs)} of pauses taken off`}
      {sharedId !== null && (
        <>
          {' '}
          <Link to={`/lost-fixes/${sharedId}`}>Under the mount point’s</Link>
        </>
      )}
      {phone && (
        <>
          {' '}
          <a href={`tel:${phone}`}>{lostFix.crewPhone}</a>
        </>
      )}
    </p>
  );
}

function Histories({
  lostFix: { roverId, roverLabel, crewId, crewName, mountPoint },
}: {
  lostFix: LostFixDetail;
}) {
  return (
    <section>
      <h2>Before this</h2>
      <ul className="plain-list">
        {roverId !== null && (
          <li>
            <Link to={`/lost-fixes?roverId=${roverId}`}>All of {roverLabel}</Link>
          </li>
        )}
        {crewId !== null && (
          <li>
            <Link to={`/lost-fixes?crewId=${crewId}`}>All of {crewName}</Link>
          </li>
        )}
        {mountPoint !== null && (
          <li>
            <Link to={`/lost-fixes?mountPoint=${encodeURIComponent(mountPoint)}`}>All on {mountPoint}</Link>
          </li>
        )}
      </ul>
    </section>
  );
}
