import type { Duty } from '@hubtack/contracts/board/lane.js';
import type { ShiftPatternDay } from '@hubtack/contracts/crews/crew.js';
import { clip, subtract, union, type Interval } from '../common/interval.js';
import { clockTimeOn, isoDateOf, localDayOf, weekdayOf } from '../common/local-day.js';

/** A shift as marked, with its pauses; an end that is null has not come yet. */
export interface ShiftMark {
  start: number;
  end: number | null;
  pauses: readonly { start: number; end: number | null }[];
}

/**
 * When a crew is paid to have a fix on one local day. `noShiftSet`: neither marks nor pattern say so, and the time
 * from the first to the last heard instant counts instead (each rover's own; the lists are empty here).
 */
export interface CrewDay {
  basis: 'marks' | 'pattern' | 'noShiftSet';
  /** Shifts minus pauses. What has not ended runs to the end of the day: cut at "now" before counting. */
  onShift: Interval[];
  pauses: Interval[];
}

const DAY_BEFORE_MS = 12 * 3_600_000;

/** Local days on which no pattern counts, YYYY-MM-DD. */
export type Holidays = ReadonlySet<string>;
const noHolidays: Holidays = new Set();

function patternOn(
  day: Interval,
  pattern: readonly ShiftPatternDay[],
  zone: string,
  holidays: Holidays,
): Interval[] {
  if (holidays.size > 0 && holidays.has(isoDateOf(day.start, zone))) return [];
  const weekday = weekdayOf(day, zone);
  return pattern
    .filter((line) => line.weekday === weekday)
    .map((line) => {
      const start = clockTimeOn(day, line.start, zone);
      const end = clockTimeOn(day, line.end, zone);
      // An end at or before the start is on the next day.
      return end > start
        ? { start, end }
        : { start, end: clockTimeOn(localDayOf(day.end, zone), line.end, zone) };
    });
}

/** On-shift time of a crew on a local day: marks where there are any, else the weekly pattern (design: "On shift"). */
export function crewDayOf(
  day: Interval,
  marks: readonly ShiftMark[],
  pattern: readonly ShiftPatternDay[],
  zone: string,
  holidays: Holidays = noHolidays,
): CrewDay {
  const closed = (part: { start: number; end: number | null }) => ({
    start: part.start,
    end: part.end ?? day.end,
  });
  const marked = clip(union(marks.map(closed)), day);
  if (marked.length > 0) {
    const pauses = clip(union(marks.flatMap((mark) => mark.pauses.map(closed))), day);
    return { basis: 'marks', onShift: subtract(marked, pauses), pauses };
  }
  // A shift of the evening before may run past midnight into this day.
  const dayBefore = localDayOf(day.start - DAY_BEFORE_MS, zone);
  const planned = [
    ...patternOn(dayBefore, pattern, zone, holidays),
    ...patternOn(day, pattern, zone, holidays),
  ];
  const onShift = clip(union(planned), day);
  return onShift.length > 0
    ? { basis: 'pattern', onShift, pauses: [] }
    : { basis: 'noShiftSet', onShift: [], pauses: [] };
}

export function dutyAt(crewDay: CrewDay, now: number): Duty {
  const holds = (interval: Interval) => interval.start <= now && now < interval.end;
  if (crewDay.basis === 'noShiftSet') return 'noShiftSet';
  if (crewDay.pauses.some(holds)) return 'paused';
  return crewDay.onShift.some(holds) ? 'onShift' : 'offShift';
}
