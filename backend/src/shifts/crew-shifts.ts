import type { ShiftPatternDay } from '@hubtack/contracts/crews/crew.js';
import { clip, intersect, subtract, union, type Interval } from '../common/interval.js';
import { localDayOf } from '../common/local-day.js';
import { crewDayOf, type CrewDay, type Holidays, type ShiftMark } from './on-shift.js';

/** One shift of a crew as a whole, over midnight if need be. */
export interface CrewShift {
  basis: CrewDay['basis'];
  start: number;
  /** Null: marked, and not finished. */
  end: number | null;
  /** Without pauses; an open one reaches to the end of time: cut at "now" before counting. */
  onShift: Interval[];
  pauses: Interval[];
}

const FOREVER = Number.MAX_SAFE_INTEGER;
const HALF_DAY_MS = 12 * 3_600_000;

function localDays(window: Interval, zone: string): Interval[] {
  const days = [localDayOf(window.start, zone)];
  while (days.at(-1)!.end < window.end) days.push(localDayOf(days.at(-1)!.end, zone));
  return days;
}

const closed = ({ start, end }: { start: number; end: number | null }): Interval => ({
  start,
  end: end ?? FOREVER,
});

const overlaps = (shift: { start: number; end: number | null }, window: Interval): boolean =>
  shift.start < window.end && (shift.end ?? FOREVER) > window.start;

function markedShift(mark: ShiftMark): CrewShift {
  const pauses = union(mark.pauses.map(closed));
  return {
    basis: 'marks',
    start: mark.start,
    end: mark.end,
    onShift: subtract([closed(mark)], pauses),
    pauses,
  };
}

/**
 * Shifts of a crew that overlap the window, each whole. By local day, as in `crewDayOf`: marks where the day has any, else the
 * pattern, else from first to last heard (`heardOn`: that stretch of a local day, or null). `marks`: all that touch the
 * local days of the window and the days beside them.
 */
export function crewShiftsOf(
  window: Interval,
  marks: readonly ShiftMark[],
  pattern: readonly ShiftPatternDay[],
  zone: string,
  heardOn: (day: Interval) => Interval | null,
  holidays?: Holidays,
): CrewShift[] {
  // A shift over midnight belongs to the days on both sides.
  const days = localDays({ start: window.start - HALF_DAY_MS, end: window.end + HALF_DAY_MS }, zone);
  const planned: Interval[] = [];
  const unset: CrewShift[] = [];
  for (const day of days) {
    const ofDay = marks.filter((mark) => overlaps(mark, day));
    const { basis, onShift } = crewDayOf(day, ofDay, pattern, zone, holidays);
    if (basis === 'pattern') planned.push(...onShift);
    const heard = basis === 'noShiftSet' ? heardOn(day) : null;
    if (heard) unset.push({ basis: 'noShiftSet', ...heard, onShift: [heard], pauses: [] });
  }
  const byPattern = union(planned).map((shift): CrewShift => ({
    basis: 'pattern',
    ...shift,
    onShift: [shift],
    pauses: [],
  }));
  return [...marks.map(markedShift), ...byPattern, ...unset]
    .filter((shift) => overlaps(shift, window))
    .toSorted((a, b) => a.start - b.start);
}

/** The part of a shift in which a crew had a rover; null when it had not. */
export function clipShift(shift: CrewShift, during: { start: number; end: number | null }): CrewShift | null {
  const had = closed(during);
  const [whole] = intersect([closed(shift)], [had]);
  if (!whole) return null;
  return {
    ...shift,
    start: whole.start,
    end: whole.end === FOREVER ? null : whole.end,
    onShift: clip(shift.onShift, had),
    pauses: clip(shift.pauses, had),
  };
}
