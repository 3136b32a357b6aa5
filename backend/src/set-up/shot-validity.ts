import type { AgainReason } from '@hubtack/contracts/set-up/check-shot.js';
import type { SetUpCard } from '@hubtack/contracts/set-up/set-up-card.js';
import type { HeardSpan } from '../fixes/timeline.js';

/** What a check shot vouched for. */
export interface ShotFacts {
  at: number;
  stationId: number | null;
  mountPoint: string | null;
  /** The card that it was reduced with; null without one. */
  card: CardFacts | null;
}
export type CardFacts = Pick<
  SetUpCard,
  'poleHeightM' | 'measuringPoint' | 'antennaOffsetM' | 'tilt' | 'correctionSourceId'
> & { id: number };

/** How things stand now. */
export interface RoverNow {
  now: number;
  /** Start of the local day. */
  dayStart: number;
  stationId: number | null;
  mountPoint: string | null;
  /** Today's newest card. */
  card: CardFacts | null;
  /** Heard spans since the shot, sorted. */
  spans: readonly HeardSpan[];
}

const matters = ({ poleHeightM, measuringPoint, antennaOffsetM, tilt, correctionSourceId }: CardFacts) =>
  JSON.stringify([poleHeightM, measuringPoint, antennaOffsetM, tilt, correctionSourceId]);

/**
 * Why a check shot does not count any more; null while it does. A fix that was gone for longer than `lostMs` in one piece has been made
 * anew, and a new one may be wrong (common practice, no source). What was true stays said: base before card before fix.
 */
export function againReasonOf(shot: ShotFacts, rover: RoverNow, lostMs: number): AgainReason | null {
  if (shot.at < rover.dayStart) return 'newDay';
  const isOtherStation =
    shot.stationId !== null && rover.stationId !== null && shot.stationId !== rover.stationId;
  if (isOtherStation || shot.mountPoint !== rover.mountPoint) return 'baseChanged';
  const { card } = rover;
  if (card && card.id !== shot.card?.id && (!shot.card || matters(card) !== matters(shot.card)))
    return 'cardChanged';
  return longestWithoutFixMs(rover.spans, shot.at, rover.now) > lostMs ? 'fixLost' : null;
}

/** Looked at for every lane four times a second, so without making anything. */
function longestWithoutFixMs(spans: readonly HeardSpan[], from: number, now: number): number {
  let longest = 0;
  let fixedUntil = from;
  for (const { state, start, end } of spans) {
    if (state !== 'fixed' || end <= from || start >= now) continue;
    longest = Math.max(longest, start - fixedUntil);
    fixedUntil = end;
  }
  return Math.max(longest, now - fixedUntil);
}
