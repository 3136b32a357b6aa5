import type { BoardSnapshot, Lane } from '@hubtack/contracts/board/lane.js';
import type { LanesEvent } from '@hubtack/contracts/stream/events.js';

/** The board as this page knows it. Lanes that did not change stay the same objects, so that their rows need not be drawn again. */
export interface BoardState {
  lanes: ReadonlyMap<number, Lane>;
  /** Server clock minus this machine's, ms. */
  clockOffsetMs: number;
}

export const boardStateOf = (snapshot: BoardSnapshot, receivedAt: number): BoardState => ({
  lanes: new Map(snapshot.lanes.map((lane) => [lane.id, lane])),
  clockOffsetMs: snapshot.serverTime - receivedAt,
});

/** Whole lanes replace, changes merge, gone lanes leave. A change to a lane that is not there says nothing and is passed over. */
export function applyEvents(
  state: BoardState,
  events: readonly LanesEvent[],
  receivedAt: number,
): BoardState {
  if (events.length === 0) return state;
  const lanes = new Map(state.lanes);
  for (const event of events) {
    for (const lane of event.lanes) lanes.set(lane.id, lane);
    for (const { ribbon, ...change } of event.changes) {
      const before = lanes.get(change.id);
      if (before) lanes.set(change.id, { ...before, ...change, ribbon: ribbon ?? before.ribbon });
    }
    for (const id of event.gone) lanes.delete(id);
  }
  return { lanes, clockOffsetMs: events.at(-1)!.serverTime - receivedAt };
}
