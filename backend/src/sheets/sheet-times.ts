import { DateTime } from 'luxon';
import { union, type Interval } from '../common/interval.js';
import { isoWeekOf } from '../common/local-day.js';

const MINUTE_MS = 60_000;
const HOUR_MS = 3_600_000;
/** After a server that was down on Monday: as long as somebody still plans the week by it. */
const WEEKLY_DAYS = 3;
/** Taps and sentences of the last minutes come in. */
const DAILY_AFTER_MS = 15 * MINUTE_MS;
const DAILY_UNTIL_MS = 12 * HOUR_MS;

/**
 * The week whose sheet is due: the one before, from Monday at the local hour until Wednesday is over; null at other times.
 */
export function weeklyDue(now: number, hour: number, zone: string): string | null {
  const monday = DateTime.fromMillis(now, { zone }).startOf('week');
  const since = monday.set({ hour }).toMillis();
  const until = monday.plus({ days: WEEKLY_DAYS }).startOf('day').toMillis();
  if (now < since || now >= until) return null;
  return isoWeekOf(monday.minus({ weeks: 1 }).toMillis(), zone);
}

/** A crew's shifts that began on one local day, each whole. */
export interface CrewShiftDay {
  day: string;
  shifts: Interval[];
}

/**
 * Days of which a crew's sheet is due: all shifts that began on the day are over, the last one since a quarter of an hour, and not since
 * half a day. `parts`: shifts with their pauses, cut anyhow, of these days and those around them; one that has not ended reaches past now.
 */
export function dailyDue(parts: readonly Interval[], now: number, zone: string): CrewShiftDay[] {
  const days = new Map<string, Interval[]>();
  // Cut at midnight, the two halves of a night shift touch.
  for (const shift of union(parts)) {
    const day = DateTime.fromMillis(shift.start, { zone }).toISODate()!;
    days.set(day, [...(days.get(day) ?? []), shift]);
  }
  return [...days]
    .map(([day, shifts]) => ({ day, shifts }))
    .filter(({ shifts }) => {
      const end = shifts.at(-1)!.end;
      return now >= end + DAILY_AFTER_MS && now < end + DAILY_UNTIL_MS;
    });
}
