import type { Lane, LaneChange } from '@hubtack/contracts/board/lane.js';
import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { forChief } from '../lost-fixes/lost-fix.view.js';
import type { LanesEvent, LostFixEvent, StreamEventName } from '@hubtack/contracts/stream/events.js';

/** Which lanes and lost fixes moved since some cursor. */
export interface Moved {
  /** Figures changed. */
  changed: Set<number>;
  /** To be described anew, or not there any more. */
  whole: Set<number>;
  /** Crews that had a lane before it was described anew. */
  left: Map<number, Set<number>>;
  lostFixes: Set<number>;
}

export const nothingMoved = (): Moved => ({
  changed: new Set(),
  whole: new Set(),
  left: new Map(),
  lostFixes: new Set(),
});

export const hasMoved = (moved: Moved): boolean =>
  moved.changed.size > 0 || moved.whole.size > 0 || moved.lostFixes.size > 0;

/** Adds what moved later to what moved earlier. */
export function addMoved(into: Moved, later: Moved): void {
  for (const id of later.changed) into.changed.add(id);
  for (const id of later.whole) into.whole.add(id);
  for (const id of later.lostFixes) into.lostFixes.add(id);
  for (const [id, crewIds] of later.left) {
    const known = into.left.get(id) ?? new Set();
    for (const crewId of crewIds) known.add(crewId);
    into.left.set(id, known);
  }
}

/** Who sees what: the office everything, a crew its own lanes. */
export type Audience = 'office' | `crew:${number}` | 'nobody';

const crewOf = (audience: Audience): number | null =>
  audience.startsWith('crew:') ? Number(audience.slice(5)) : null;

export function seesCrew(audience: Audience, crewId: number | null): boolean {
  return audience === 'office' || (crewId !== null && crewOf(audience) === crewId);
}

/** Where lanes come from when a frame is written. `change` answers undefined for a lane that is not there (any more). */
export interface LaneSource {
  crewId(roverId: number): number | null;
  change(roverId: number, withRibbon: boolean): LaneChange | undefined;
  lane(roverId: number): Lane | undefined;
}

/** Where lost fixes come from: as they now stand, with the crews that may see each. */
export interface LostFixSource {
  lostFixes(ids: readonly number[]): { lostFix: LostFix; crewIds: readonly number[] }[];
}

/**
 * One server-sent event, ready to be written to any number of responses (WHATWG HTML, section 9.2.6: fields, a blank
 * line ends it; JSON text holds no line break). Without a cursor the event is no place to resume from.
 */
export function eventText(event: StreamEventName, data: unknown, cursor?: string): string {
  const id = cursor === undefined ? '' : `id: ${cursor}\n`;
  return `${id}event: ${event}\ndata: ${JSON.stringify(data)}\n\n`;
}

/** The `lanes` event for an audience; null when nothing that it may see moved. */
export function lanesEventOf(
  audience: Audience,
  moved: Moved,
  ribbons: ReadonlySet<number>,
  source: LaneSource,
  serverTime: number,
): LanesEvent | null {
  const event: LanesEvent = { serverTime, changes: [], lanes: [], gone: [] };
  for (const id of moved.whole) {
    const lane = source.lane(id);
    const before = moved.left.get(id);
    if (lane && seesCrew(audience, lane.crewId)) event.lanes.push(lane);
    else if (audience === 'office' || [...(before ?? [])].some((crewId) => seesCrew(audience, crewId)))
      event.gone.push(id);
  }
  for (const id of moved.changed) {
    if (moved.whole.has(id) || !seesCrew(audience, source.crewId(id))) continue;
    const change = source.change(id, ribbons.has(id));
    if (change) event.changes.push(change);
  }
  return event.lanes.length + event.changes.length + event.gone.length > 0 ? event : null;
}

/** The `lost-fix` event for an audience; null when none that it may see moved. */
export function lostFixEventOf(
  audience: Audience,
  moved: Moved,
  source: LostFixSource,
  serverTime: number,
): LostFixEvent | null {
  if (moved.lostFixes.size === 0) return null;
  const lostFixes = source
    .lostFixes([...moved.lostFixes])
    .filter(({ crewIds }) => audience === 'office' || crewIds.some((crewId) => seesCrew(audience, crewId)))
    .map(({ lostFix }) => (audience === 'office' ? lostFix : forChief(lostFix)));
  return lostFixes.length > 0 ? { serverTime, lostFixes } : null;
}
