import { heightKind, type HeightKind } from '@hubtack/contracts/control-points/control-point.js';
import type { ShiftPatternDay } from '@hubtack/contracts/crews/crew.js';

/** A cell cannot be read; the message says what to write. */
export class CellProblem extends Error {}

/**
 * A number with a decimal point; or with a decimal comma, where the list has another sign between its columns.
 * A comma between columns means a language that groups thousands by it, so a quoted `1,234` is not guessed at;
 * neither is it between tabs, which every language writes. @throws CellProblem
 */
export function numberCell(cell: string, delimiter: string): number {
  const plain = cell.replace(/^\u2212/, '-');
  const hint = 'Write a number such as 47.25';
  if (!/^[+-]?\d+([.,]\d+)?$/.test(plain)) throw new CellProblem(hint);
  if (plain.includes(',')) {
    const mayBeThousands = /^[+-]?\d{1,3},\d{3}$/.test(plain);
    if (delimiter === ',' || (delimiter !== ';' && mayBeThousands))
      throw new CellProblem(`${hint}: the comma here can be read in two ways`);
  }
  return Number(plain.replace(',', '.'));
}

const DAYS = ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'];
const DAYS_HINT = 'Write days such as Mon-Fri, or Mon Wed Sat';

function dayNumber(word: string): number {
  const index = DAYS.findIndex((day) => day.toLowerCase() === word.slice(0, 3).toLowerCase());
  if (index < 0) throw new CellProblem(DAYS_HINT);
  return index + 1;
}

/** Weekdays, 1 Monday to 7 Sunday, from words such as `Mon-Fri` or `Mon Wed Sat`. @throws CellProblem */
export function daysCell(cell: string): number[] {
  const days = cell
    .split(/[\s,;+]+(?!-)/)
    .filter((word) => word !== '')
    .flatMap((word) => {
      const [from, to, ...more] = word.split(/[-\u2013]/);
      if (more.length > 0) throw new CellProblem(DAYS_HINT);
      const first = dayNumber(from ?? '');
      const last = to === undefined ? first : dayNumber(to);
      return Array.from({ length: ((last - first + 7) % 7) + 1 }, (_, step) => ((first - 1 + step) % 7) + 1);
    });
  return [...new Set(days)].toSorted((a, b) => a - b);
}

/** A time such as 7:00 as 07:00. @throws CellProblem */
export function timeCell(cell: string): string {
  const match = /^(\d{1,2}):([0-5]\d)(?::00)?$/.exec(cell);
  if (!match || Number(match[1]) > 23) throw new CellProblem('Write a time such as 07:00');
  return `${match[1]!.padStart(2, '0')}:${match[2]}`;
}

/** @throws CellProblem */
export function heightKindCell(cell: string): HeightKind {
  const kind = heightKind.safeParse(cell.toLowerCase());
  if (!kind.success) throw new CellProblem(`Write ${heightKind.options.join(' or ')}`);
  return kind.data;
}

/** A pattern in words, for before and after. */
export const patternWords = (pattern: readonly ShiftPatternDay[]): string =>
  pattern
    .toSorted((a, b) => a.weekday - b.weekday)
    .map(({ weekday, start, end }) => `${DAYS[weekday - 1]} ${start}-${end}`)
    .join(', ');
