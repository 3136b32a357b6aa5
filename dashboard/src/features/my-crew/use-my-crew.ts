import { useQuery } from '@tanstack/react-query';
import { ApiError } from '../../lib/api';
import { crewDayQuery } from '../../lib/my-crew';
import { boardQuery, type LiveBoard } from '../../live/board-query';
import { useFreshness } from '../../live/live-context';
import { useLanes, useServerNow } from '../../live/use-lanes';
import type { Freshness } from '../../live/stream-status';
import { fromLane, fromSpans, type RoverNow } from './rover-now';

const offset = (board: LiveBoard) => Math.round(board.clockOffsetMs / 1000) * 1000;

/** Of when the lanes are, by this machine's clock; null while they are of now. */
function staleSince(freshness: Freshness, now: number): number | null {
  switch (freshness.kind) {
    case 'cut':
      return freshness.since;
    case 'delayed':
      return now - freshness.ms;
    default:
      return null;
  }
}

/** The crew from its two sources: lanes that the stream keeps up to date, and the day. Either may be missing. */
export function useMyCrew(crewId: number) {
  const now = useServerNow();
  const freshness = useFreshness();
  const { data: board, isPending: isBoardPending } = useLanes();
  const { data: clockOffset = 0 } = useQuery({ ...boardQuery, select: offset });
  const { data: dated, error, isPending, refetch } = useQuery(crewDayQuery(crewId));

  const stale = staleSince(freshness, now - clockOffset);
  const cutSince = stale === null ? null : stale + clockOffset;
  const lanes = [...(board?.values() ?? [])].filter((lane) => lane.crewId === crewId);
  const rovers: RoverNow[] = board
    ? lanes.map((lane) => fromLane(lane, now, cutSince))
    : (dated?.day.rovers ?? []).map((rover) => fromSpans(rover, dated!.asOf));
  const isOffline = error instanceof ApiError && error.code === 'offline';
  const hasNoSignal = freshness.kind === 'cut' || dated?.isKept === true || isOffline;
  return {
    now,
    day: dated?.day,
    rovers: rovers.toSorted((a, b) => a.label.localeCompare(b.label)),
    name: dated?.day.crewName ?? lanes[0]?.crewName ?? 'My crew',
    siteName: lanes[0]?.siteName ?? null,
    isLoading: !dated && !board && (isPending || isBoardPending),
    /** Of when the page is, while there is no signal. */
    asOf: hasNoSignal ? (rovers[0]?.asOf ?? dated?.asOf ?? cutSince) : null,
    hasNoSignal,
    error: isOffline && (dated || board) ? null : error,
    refetch,
  };
}
