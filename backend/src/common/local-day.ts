import { DateTime } from 'luxon';
import type { Interval } from './interval.js';

/** The local day that holds an instant: midnight to midnight in the zone, 23 or 25 hours when clocks change. */
export function localDayOf(instant: number, zone: string): Interval {
  const start = DateTime.fromMillis(instant, { zone }).startOf('day');
  // Plus a calendar day, then its start: some zones change their clocks at midnight.
  return { start: start.toMillis(), end: start.plus({ days: 1 }).startOf('day').toMillis() };
}

/** ISO 8601 week of an instant in the zone, such as 2026-W53. */
export function isoWeekOf(instant: number, zone: string): string {
  return DateTime.fromMillis(instant, { zone }).toFormat("kkkk-'W'WW");
}

/** Monday 00:00 to Monday 00:00 in the zone. Throws RangeError for a week that does not exist, such as 2025-W53. */
export function isoWeekInterval(week: string, zone: string): Interval {
  const match = /^(\d{4})-W(\d{2})$/.exec(week);
  const start =
    match && DateTime.fromObject({ weekYear: Number(match[1]), weekNumber: Number(match[2]) }, { zone });
  if (!start?.isValid || isoWeekOf(start.toMillis(), zone) !== week)
    throw new RangeError(`There is no week ${week}`);
  return { start: start.toMillis(), end: start.plus({ weeks: 1 }).toMillis() };
}

/** Instants of two local clock times on the local day; a time that does not exist is taken after the gap. */
export function clockTimeOn(day: Interval, clockTime: string, zone: string): number {
  const [hour, minute] = clockTime.split(':').map(Number) as [number, number];
  return DateTime.fromMillis(day.start, { zone }).set({ hour, minute, second: 0, millisecond: 0 }).toMillis();
}

/** ISO 8601 weekday, 1 Monday to 7 Sunday, of a local day. */
export const weekdayOf = (day: Interval, zone: string): number =>
  DateTime.fromMillis(day.start, { zone }).weekday;

/** The local day that an instant lies on, YYYY-MM-DD. */
export const isoDateOf = (instant: number, zone: string): string =>
  DateTime.fromMillis(instant, { zone }).toISODate()!;
