import type { BoardSnapshot, Lane } from '@hubtack/contracts/board/lane.js';
import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import type { LanesEvent, LostFixEvent } from '@hubtack/contracts/stream/events.js';

/** The board as this page knows it. Lanes that did not change stay the same objects, so that their rows need not be drawn again. */
export interface BoardState {
  lanes: ReadonlyMap<number, Lane>;
  /** Those that have not ended and are not closed, by id. */
  lostFixes: ReadonlyMap<number, LostFix>;
  /** Server clock minus this machine's, ms. */
  clockOffsetMs: number;
}

export const boardStateOf = (snapshot: BoardSnapshot, receivedAt: number): BoardState => ({
  lanes: new Map(snapshot.lanes.map((lane) => [lane.id, lane])),
  lostFixes: new Map(snapshot.lostFixes.map((lostFix) => [lostFix.id, lostFix])),
  clockOffsetMs: snapshot.serverTime - receivedAt,
});

/** Whole lanes replace, changes merge, gone lanes leave. A change to a lane that is not there says nothing and is passed over. */
export function applyEvents(
  state: BoardState,
  events: readonly (LanesEvent | LostFixEvent)[],
  receivedAt: number,
): BoardState {
  if (events.length === 0) return state;
  const lanes = new Map(state.lanes);
  let { lostFixes } = state;
  for (const event of events) {
    if ('lostFixes' in event) {
      lostFixes = withLostFixes(lostFixes, event.lostFixes);
      continue;
    }
    for (const lane of event.lanes) lanes.set(lane.id, lane);
    for (const { ribbon, ...change } of event.changes) {
      const before = lanes.get(change.id);
      if (before) lanes.set(change.id, { ...before, ...change, ribbon: ribbon ?? before.ribbon });
    }
    for (const id of event.gone) lanes.delete(id);
  }
  return { lanes, lostFixes, clockOffsetMs: events.at(-1)!.serverTime - receivedAt };
}

function withLostFixes(
  before: ReadonlyMap<number, LostFix>,
  changed: readonly LostFix[],
): ReadonlyMap<number, LostFix> {
  const after = new Map(before);
  for (const lostFix of changed) {
    if (lostFix.endAt === null && lostFix.closed === null) after.set(lostFix.id, lostFix);
    else after.delete(lostFix.id);
  }
  return after;
}
