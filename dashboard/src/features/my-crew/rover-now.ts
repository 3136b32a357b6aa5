import type { Lane, RibbonSpan } from '@hubtack/contracts/board/lane.js';
import type { FixState } from '@hubtack/contracts/fixes/fix-state.js';
import { stateNow } from '../../live/lane-figures';

/** One rover as the page shows it. */
export interface RoverNow {
  id: number;
  label: string;
  state: FixState;
  since: number | null;
  /** Null: as it is now. Else the phone has no signal, and this is what it last knew, of this time. */
  asOf: number | null;
  lane: Lane | null;
}

/** A span reaches to the end of the hold time or to the answer, whichever came first; the header has whole seconds. */
const STILL_HOLDS_MS = 2000;

/** By the board. While the stream is cut, the rover has not gone quiet: this phone has. */
export function fromLane(lane: Lane, now: number, cutSince: number | null): RoverNow {
  const at = cutSince ?? now;
  return { id: lane.id, label: lane.roverLabel, ...stateNow(lane, at), asOf: cutSince, lane };
}

/** By the day alone, when the board could not be read. */
export function fromSpans(
  rover: { id: number; label: string; spans: readonly RibbonSpan[] },
  asOf: number,
): RoverNow {
  const last = rover.spans.at(-1);
  const holds = last !== undefined && asOf - last.end <= STILL_HOLDS_MS;
  const said = holds
    ? { state: last.state, since: last.start }
    : { state: 'silent' as const, since: last?.end ?? null };
  return { id: rover.id, label: rover.label, ...said, asOf, lane: null };
}
