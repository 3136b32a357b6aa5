import type { Interval } from '../common/interval.js';
import type { RosterEntry } from '../rovers/roster.repository.js';
import type { RoverShift } from '../shifts/shifts.service.js';
import { noCorrectionsYet, type Corrections } from './corrections-watch.js';

/** What the watch keeps in memory of a rover; all of it can be read anew. */
export interface WatchedRover {
  entry: RosterEntry;
  /** Since when it is on the mount point of its entry, as far as this process has seen it change. */
  mountPointSince: number;
  /** Shifts that overlap `shiftsWindow`, those of a day without a shift set left out of today; null: to be read. */
  shifts: RoverShift[] | null;
  shiftsWindow: Interval;
  /** Today when no shift is set for it, cut to the time the crew has had the rover: whatever is heard counts. */
  unsetToday: Interval | null;
  corrections: Corrections;
  /** Looked at up to here; sentences that come late set it back. */
  lookedAt: number;
  /** Something came in since. */
  isStale: boolean;
  hasOpen: boolean;
}

export const watch = (entry: RosterEntry, lookedAt: number): WatchedRover => ({
  entry,
  mountPointSince: 0,
  shifts: null,
  shiftsWindow: { start: 0, end: 0 },
  unsetToday: null,
  corrections: noCorrectionsYet,
  lookedAt,
  isStale: true,
  hasOpen: true,
});

/** The shift that the instant is in, a pause included. */
const shiftAt = (rover: WatchedRover, now: number): RoverShift | undefined =>
  rover.shifts?.find(({ start, end }) => start <= now && (end === null || now < end));

/** On shift and not paused. Where no shift is set: while it is heard. */
export function isWorking(rover: WatchedRover, now: number, heldUntil: number | null): boolean {
  if (rover.unsetToday && now < rover.unsetToday.end) return (heldUntil ?? 0) > now;
  return shiftAt(rover, now)?.onShift.some(({ start, end }) => start <= now && now < end) ?? false;
}
