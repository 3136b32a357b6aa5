const DAY_MS = 86_400_000;

/** Monday of an ISO 8601 week, as a date that knows no zone (UTC midnight). */
export function mondayOf(week: string): Date {
  const year = Number(week.slice(0, 4));
  const number = Number(week.slice(6));
  // 4 January is always in week 1.
  const fourth = new Date(Date.UTC(year, 0, 4));
  const weekday = (fourth.getUTCDay() + 6) % 7;
  return new Date(fourth.getTime() + ((number - 1) * 7 - weekday) * DAY_MS);
}

/** ISO week of a date that knows no zone: the year that its Thursday is in, and how many Thursdays that year has had. */
export function isoWeekOf(date: Date): string {
  const weekday = (date.getUTCDay() + 6) % 7;
  const thursday = new Date(date.getTime() + (3 - weekday) * DAY_MS);
  const year = thursday.getUTCFullYear();
  const number = Math.floor((thursday.getTime() - Date.UTC(year, 0, 1)) / (7 * DAY_MS)) + 1;
  return `${year}-W${String(number).padStart(2, '0')}`;
}

/** The week so many weeks later. */
export const weekAfter = (week: string, weeks: number): string =>
  isoWeekOf(new Date(mondayOf(week).getTime() + weeks * 7 * DAY_MS));

/** 28 Sept – 4 Oct 2026. */
export function weekDates(week: string): string {
  const monday = mondayOf(week);
  const sunday = new Date(monday.getTime() + 6 * DAY_MS);
  const day = (date: Date, year: boolean) =>
    date.toLocaleDateString('en-GB', {
      day: 'numeric',
      month: 'short',
      timeZone: 'UTC',
      ...(year ? { year: 'numeric' } : {}),
    });
  return `${day(monday, monday.getUTCFullYear() !== sunday.getUTCFullYear())} – ${day(sunday, true)}`;
}
