import type { Lengths, WeekFigures, WeekShift } from '@hubtack/contracts/weekly/weekly.js';
import { noTotals, totalOf, wholeOf } from '@hubtack/contracts/fixes/totals.js';
import { mean, percentile } from '../common/statistics.js';
import type { NamedShiftFigures } from './shift-figures.repository.js';

const HOUR_MS = 3_600_000;
const stateTotalNames = Object.values(totalOf);
const noLengths: Lengths = { n: 0, meanMs: null, p90Ms: null };

const lengthsOf = (values: readonly number[]): Lengths => {
  if (values.length === 0) return noLengths;
  const round = (value: number | null) => (value === null ? null : Math.round(value));
  return { n: values.length, meanMs: round(mean(values)), p90Ms: round(percentile(values, 0.9)) };
};

/**
 * Figures of any number of rover-shifts: sums of times, never means of shares. Cost: paid time without a fix at each crew's own rate; null
 * when a crew that has such time has no rate, or when money is not for this reader.
 */
export function weekFigures(rows: readonly NamedShiftFigures[], withMoney: boolean): WeekFigures {
  // One pass: a week is a thousand rows, and each is also shown by itself.
  const totals = noTotals();
  const regains: number[] = [];
  const firstFixes: number[] = [];
  let withinToleranceMs = 0;
  let lostFixes = 0;
  let cost = 0;
  let isPriced = rows.length > 0;
  for (const row of rows) {
    for (const name of stateTotalNames) totals[name] += row[name];
    withinToleranceMs += row.withinToleranceMs;
    lostFixes += row.lostFixes;
    if (row.regains.length > 0) regains.push(...row.regains);
    if (row.firstFixMs !== null) firstFixes.push(row.firstFixMs);
    const withoutFixMs = row.floatMs + row.codeMs + row.noneMs + row.silentMs;
    if (row.hourlyRate !== null) cost += (withoutFixMs / HOUR_MS) * row.hourlyRate;
    else if (withoutFixMs > 0) isPriced = false;
  }
  return {
    totals,
    withinToleranceMs,
    lostFixes,
    regain: lengthsOf(regains),
    firstFix: lengthsOf(firstFixes),
    paidWithoutFixMs: wholeOf(totals) - totals.fixedMs,
    cost: withMoney && isPriced ? Math.round(cost * 100) / 100 : null,
  };
}

/** One rover-shift as the week shows it. */
export const weekShiftOf = (row: NamedShiftFigures, withMoney: boolean): WeekShift => ({
  day: row.day,
  crewId: row.crewId,
  crewName: row.crewName,
  roverId: row.roverId,
  roverLabel: row.roverLabel,
  start: row.startAt,
  end: row.endAt,
  basis: row.basis,
  figures: weekFigures([row], withMoney),
});
