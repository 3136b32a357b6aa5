import { percent } from '@hubtack/contracts/fixes/percent.js';
import { DateTime } from 'luxon';

export const NO_DATA = 'no data';

/** A share as it may be shown (design: "Figures"), as a number of percent; null without a whole. */
export function shareOf(part: number, whole: number): number | null {
  const words = percent(part, whole);
  return words === NO_DATA ? null : Number.parseFloat(words);
}

/** Whole minutes, rounded down as in the week's sentence: 21 h 10 min. */
export function hoursWords(ms: number): string {
  const minutes = Math.floor(ms / 60_000);
  if (minutes === 0 && ms > 0) return 'less than a minute';
  return minutes < 60 ? `${minutes} min` : `${Math.floor(minutes / 60)} h ${minutes % 60} min`;
}

/** 5 min 12 s, to the nearest second; "no data" for none. */
export function lengthWords(ms: number | null): string {
  if (ms === null) return NO_DATA;
  const seconds = Math.round(ms / 1000);
  if (seconds < 60) return `${seconds} s`;
  const minutes = Math.floor(seconds / 60);
  return minutes < 60
    ? `${minutes} min ${seconds % 60} s`
    : `${Math.floor(minutes / 60)} h ${minutes % 60} min`;
}

/** h:mm:ss, with milliseconds when asked: nothing rounded, so that columns add up. */
export function exactTime(ms: number, withMs: boolean): string {
  const pad = (value: number, digits: number) => String(value).padStart(digits, '0');
  const seconds = Math.floor(ms / 1000);
  const clock = `${Math.floor(seconds / 3600)}:${pad(Math.floor(seconds / 60) % 60, 2)}:${pad(seconds % 60, 2)}`;
  return withMs ? `${clock}.${pad(ms % 1000, 3)}` : clock;
}

export function moneyWords(amount: number | null, currency: string): string {
  if (amount === null) return 'not known: a crew has no hourly rate';
  const format = new Intl.NumberFormat('en-GB', { style: 'currency', currency, currencyDisplay: 'code' });
  return format.format(amount).replaceAll('\u00A0', ' ');
}

export const count = (n: number, one: string, many: string): string => `${n} ${n === 1 ? one : many}`;

/** Names may hold anything; in a subject or a line of text they stay on their line. */
export const oneLine = (text: string): string => text.replaceAll(/[\p{Cc}\s]+/gu, ' ').trim();

/** 28 Sep to 4 Oct 2026 */
export function daysWords(from: number, to: number, zone: string): string {
  const first = DateTime.fromMillis(from, { zone });
  const last = DateTime.fromMillis(to - 1, { zone });
  const isOneYear = first.year === last.year;
  return `${first.toFormat(isOneYear ? 'd LLL' : 'd LLL yyyy')} to ${last.toFormat('d LLL yyyy')}`;
}
