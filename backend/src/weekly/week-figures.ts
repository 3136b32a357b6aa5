import type { Lengths, WeekFigures } from '@hubtack/contracts/weekly/weekly.js';
import { addTotals, noTotals, wholeOf } from '@hubtack/contracts/fixes/totals.js';
import { mean, percentile } from '../common/statistics.js';
import type { NamedShiftFigures } from './shift-figures.repository.js';

const HOUR_MS = 3_600_000;

const lengthsOf = (values: readonly number[]): Lengths => {
  const round = (value: number | null) => (value === null ? null : Math.round(value));
  return { n: values.length, meanMs: round(mean(values)), p90Ms: round(percentile(values, 0.9)) };
};

/**
 * Figures of any number of rover-shifts: sums of times, never means of shares. Cost: paid time without a fix at each crew's own rate; null
 * when a crew that has such time has no rate, or when money is not for this reader.
 */
export function weekFigures(rows: readonly NamedShiftFigures[], withMoney: boolean): WeekFigures {
  const totals = rows.reduce((sum, row) => addTotals(sum, row), noTotals());
  const withoutFix = (row: NamedShiftFigures) => wholeOf(row) - row.fixedMs;
  const isPriced = rows.every((row) => row.hourlyRate !== null || withoutFix(row) === 0);
  const cost = rows.reduce((sum, row) => sum + (withoutFix(row) / HOUR_MS) * (row.hourlyRate ?? 0), 0);
  return {
    totals,
    withinToleranceMs: rows.reduce((sum, row) => sum + row.withinToleranceMs, 0),
    lostFixes: rows.reduce((sum, row) => sum + row.lostFixes, 0),
    regain: lengthsOf(rows.flatMap((row) => row.regains)),
    firstFix: lengthsOf(rows.flatMap((row) => (row.firstFixMs === null ? [] : [row.firstFixMs]))),
    paidWithoutFixMs: wholeOf(totals) - totals.fixedMs,
    cost: withMoney && isPriced && rows.length > 0 ? Math.round(cost * 100) / 100 : null,
  };
}
