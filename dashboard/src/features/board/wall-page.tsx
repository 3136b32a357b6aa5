import type { OpenDisplayBody } from '@hubtack/contracts/displays/display-link.js';
import { useQuery } from '@tanstack/react-query';
import { useEffect, useMemo, useState } from 'react';
import { Navigate } from 'react-router-dom';
import { Failed, Loading } from '../../components/query-states';
import { LiveProvider } from '../../live/live-context';
import { StreamState } from '../../live/stream-state';
import { useLanes, useOpenLostFixes, useServerNow } from '../../live/use-lanes';
import { clockTime, zoneName } from '../../lib/format';
import { meQuery, SignedIn, useMe, useSigningIn } from '../../lib/session';
import { isOnShift } from './filter';
import { LaneList } from './lane-list';
import { StateCounts } from './state-counts';
import { useCalmOrder } from './use-calm-order';
import './board.css';
import './wall.css';

const neverHeld = () => false;

function Wall() {
  const { data: board, error, refetch } = useLanes();
  const { firmName, timeZone } = useMe();
  const now = useServerNow();
  const lostFixes = useOpenLostFixes();
  const lanes = useMemo(() => [...(board?.values() ?? [])], [board]);
  const onShift = useMemo(() => lanes.filter((lane) => isOnShift(lane, now)), [lanes, now]);
  const order = useCalmOrder(onShift, lostFixes, now, neverHeld);
  if (!board && error) return <Failed error={error} retry={() => void refetch()} />;
  if (!board) return <Loading what="the board" />;
  return (
    <main className="wall">
      <header>
        <h1>{firmName}</h1>
        <StreamState />
        <time>
          {clockTime(now, timeZone)} {zoneName(now, timeZone)}
        </time>
      </header>
      <StateCounts lanes={lanes} now={now} chosen={null} onChoose={null} />
      <LaneList order={order} openId={null} onOpen={null} />
      <p className="caution">Fixed is the receiver’s own claim. A quiet rover: call the crew.</p>
    </main>
  );
}

/** The board for a screen on the wall: larger, no controls. Opened by a display link whose token leaves the address at once. */
export default function WallPage() {
  const [token] = useState(() => location.hash.slice(1));
  const opening = useSigningIn<OpenDisplayBody>('/api/displays/open');
  const { data, isPending, error } = useQuery({ ...meQuery, enabled: token === '' || opening.isSuccess });
  const { mutate } = opening;
  useEffect(() => {
    if (token === '') return;
    history.replaceState(null, '', '/wall');
    mutate({ token });
  }, [token, mutate]);
  if (opening.error) return <Failed error={opening.error} retry={() => location.reload()} />;
  if (error) return <Failed error={error} retry={() => location.reload()} />;
  if (isPending || opening.isPending) return <Loading what="the wall board" />;
  if (!data) return <Navigate to="/sign-in" replace state={{ from: '/wall' }} />;
  return (
    <SignedIn value={data}>
      <LiveProvider>
        <Wall />
      </LiveProvider>
    </SignedIn>
  );
}
