import { wholeOf } from '@hubtack/contracts/fixes/totals.js';
import type { WeekShift } from '@hubtack/contracts/weekly/weekly.js';

const values = {
  day: (shift: WeekShift) => `${shift.day} ${shift.crewName} ${shift.roverLabel}`,
  crew: (shift: WeekShift) => `${shift.crewName} ${shift.day}`,
  rover: (shift: WeekShift) => `${shift.roverLabel} ${shift.day}`,
  onShift: ({ figures }: WeekShift) => wholeOf(figures.totals),
  uptime: ({ figures }: WeekShift) => figures.totals.fixedMs / Math.max(1, wholeOf(figures.totals)),
  float: ({ figures }: WeekShift) => figures.totals.floatMs,
  code: ({ figures }: WeekShift) => figures.totals.codeMs,
  none: ({ figures }: WeekShift) => figures.totals.noneMs,
  silent: ({ figures }: WeekShift) => figures.totals.silentMs,
  lostFixes: ({ figures }: WeekShift) => figures.lostFixes,
  without: ({ figures }: WeekShift) => figures.paidWithoutFixMs,
};
export type SortColumn = keyof typeof values;

/** Sorted by a column; equal ones stay in the order of their days. */
export function sortShifts(shifts: readonly WeekShift[], by: SortColumn, isDown: boolean): WeekShift[] {
  const of = values[by];
  const compare = (a: WeekShift, b: WeekShift): number => {
    const [left, right] = [of(a), of(b)];
    return typeof left === 'string' ? left.localeCompare(String(right)) : left - Number(right);
  };
  return shifts.toSorted(
    (a, b) => (isDown ? -1 : 1) * compare(a, b) || values.day(a).localeCompare(values.day(b)),
  );
}
