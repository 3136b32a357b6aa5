import Papa from 'papaparse';
import { holiday, type Holiday } from '@hubtack/contracts/settings/holidays.js';

export interface ReadLines {
  days: Holiday[];
  errors: { line: number; detail: string }[];
}

/** Lines such as `2026-12-25, Christmas Day`, also with a semicolon or a tab between. */
export function readHolidayLines(text: string): ReadLines {
  const result: ReadLines = { days: [], errors: [] };
  const { data } = Papa.parse<string[]>(text.replace(/^\uFEFF/, '').trim());
  for (const [index, [day = '', ...rest]] of data.entries()) {
    const name = rest.join(', ').trim();
    if (day.trim() === '' && name === '') continue;
    // A heading is no day.
    if (index === 0 && /^(day|date)$/i.test(day.trim())) continue;
    const read = holiday.safeParse({ day: day.trim(), name });
    if (read.success) result.days.push(read.data);
    else result.errors.push({ line: index + 1, detail: read.error.issues[0]!.message });
  }
  return result;
}

/** The list with more days; a day that is there already takes the new name. */
export function withDays(list: readonly Holiday[], days: readonly Holiday[]): Holiday[] {
  const byDay = new Map([...list, ...days].map((one) => [one.day, one]));
  return [...byDay.values()].toSorted((a, b) => a.day.localeCompare(b.day));
}
