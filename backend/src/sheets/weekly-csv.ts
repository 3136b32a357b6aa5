import { fixStates, fixStateWords } from '@hubtack/contracts/fixes/fix-state.js';
import { totalOf, wholeOf } from '@hubtack/contracts/fixes/totals.js';
import type { WeekFigures, Weekly, WeekShift } from '@hubtack/contracts/weekly/weekly.js';
import { DateTime } from 'luxon';
import { csvOf, type CsvCell } from './csv.js';
import { shareOf } from './sheet-words.js';

const HOUR_MS = 3_600_000;
const basisWords: Record<WeekShift['basis'], string> = {
  marks: 'marked',
  pattern: 'weekly pattern',
  noShiftSet: 'no shift set',
};

interface Row {
  shift: WeekShift | null;
  figures: WeekFigures;
}
interface Column {
  name: string;
  cell: (row: Row) => CsvCell;
}

/**
 * The week as a table: one row for each rover-shift, cut at midnight, then their sum. Times both in hours, to read, and in milliseconds, in
 * which the states add up to on-shift time exactly. A share of nothing is an empty cell.
 */
export function weeklyCsv(weekly: Weekly, withMoney: boolean): string {
  const columns = columnsOf(weekly, withMoney);
  const rows = [
    ...weekly.shifts.map((shift): Row => ({ shift, figures: shift.figures })),
    { shift: null, figures: weekly.total },
  ];
  return csvOf(
    columns.map(({ name }) => name),
    rows.map((row) => columns.map(({ cell }) => cell(row))),
  );
}

function columnsOf({ week, timeZone, currency }: Weekly, withMoney: boolean): Column[] {
  const local = (at: number) => DateTime.fromMillis(at, { zone: timeZone }).toFormat('yyyy-MM-dd HH:mm:ss');
  const utc = (at: number) => new Date(at).toISOString();
  return [
    { name: 'Week', cell: () => week },
    { name: 'Day', cell: ({ shift }) => shift?.day ?? 'Total' },
    { name: 'Crew', cell: ({ shift }) => shift?.crewName ?? null },
    { name: 'Rover', cell: ({ shift }) => shift?.roverLabel ?? null },
    { name: 'Shift set by', cell: ({ shift }) => shift && basisWords[shift.basis] },
    { name: `Start (${timeZone})`, cell: ({ shift }) => shift && local(shift.start) },
    { name: `End (${timeZone})`, cell: ({ shift }) => (shift?.end == null ? null : local(shift.end)) },
    { name: 'Start (UTC)', cell: ({ shift }) => shift && utc(shift.start) },
    { name: 'End (UTC)', cell: ({ shift }) => (shift?.end == null ? null : utc(shift.end)) },
    ...timeColumns('On shift', ({ totals }) => wholeOf(totals)),
    ...fixStates.flatMap((state) =>
      timeColumns(fixStateWords[state], ({ totals }) => totals[totalOf[state]]),
    ),
    shareColumn('Fix uptime', ({ totals }) => [totals.fixedMs, wholeOf(totals)]),
    shareColumn('Reporting', ({ totals }) => [wholeOf(totals) - totals.silentMs, wholeOf(totals)]),
    shareColumn('Fixed while reporting', ({ totals }) => [totals.fixedMs, wholeOf(totals) - totals.silentMs]),
    ...timeColumns('Within tolerance', ({ withinToleranceMs }) => withinToleranceMs),
    shareColumn('Within tolerance', ({ withinToleranceMs, totals }) => [withinToleranceMs, wholeOf(totals)]),
    { name: 'Lost fixes (count)', cell: ({ figures }) => figures.lostFixes },
    { name: 'Regained (count)', cell: ({ figures }) => figures.regain.n },
    lengthColumn('Time to regain, mean', ({ regain }) => regain.meanMs),
    lengthColumn('Time to regain, 90th percentile type 7', ({ regain }) => regain.p90Ms),
    lengthColumn('Time to first fix, mean', ({ firstFix }) => firstFix.meanMs),
    ...timeColumns('Paid time without a fix', ({ paidWithoutFixMs }) => paidWithoutFixMs),
    ...(withMoney ? [moneyColumn(currency)] : []),
  ];
}

function timeColumns(name: string, msOf: (figures: WeekFigures) => number): Column[] {
  return [
    { name: `${name} (h)`, cell: ({ figures }) => ({ value: msOf(figures) / HOUR_MS, decimals: 4 }) },
    { name: `${name} (ms)`, cell: ({ figures }) => msOf(figures) },
  ];
}

function shareColumn(
  name: string,
  of: (figures: WeekFigures) => readonly [part: number, whole: number],
): Column {
  return {
    name: `${name} (%)`,
    cell: ({ figures }) => {
      const value = shareOf(...of(figures));
      return value === null ? null : { value, decimals: 1 };
    },
  };
}

function lengthColumn(name: string, msOf: (figures: WeekFigures) => number | null): Column {
  return {
    name: `${name} (s)`,
    cell: ({ figures }) => {
      const ms = msOf(figures);
      return ms === null ? null : { value: ms / 1000, decimals: 3 };
    },
  };
}

const moneyColumn = (currency: string): Column => ({
  name: `Cost of paid time without a fix (${currency})`,
  cell: ({ figures: { cost } }) => (cost === null ? null : { value: cost, decimals: 2 }),
});
