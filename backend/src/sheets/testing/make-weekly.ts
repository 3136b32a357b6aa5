import type { StateTotals } from '@hubtack/contracts/fixes/timeline.js';
import { noTotals, wholeOf } from '@hubtack/contracts/fixes/totals.js';
import type { Weekly } from '@hubtack/contracts/weekly/weekly.js';
import { topographic } from '@hubtack/contracts/weekly/tolerance-profile.js';
import { isoWeekInterval } from '../../common/local-day.js';
import type { NamedShiftFigures } from '../../weekly/shift-figures.repository.js';
import { weekFigures, weekShiftOf } from '../../weekly/week-figures.js';

const HOUR_MS = 3_600_000;
const ZONE = 'Australia/Hobart';
const WEEK = '2026-W40';

export interface TestShift {
  crewName: string;
  totals: Partial<StateTotals>;
  hourlyRate?: number | null;
  lostFixes?: number;
  regains?: number[];
}

/** A week of these rover-shifts, one a day from Monday on; its figures by the product's own arithmetic. */
export function makeWeekly(
  shifts: readonly TestShift[],
  change: Partial<Weekly> = {},
  withMoney = true,
): Weekly {
  const { start: from, end: to } = isoWeekInterval(WEEK, ZONE);
  const crewIds = [...new Set(shifts.map(({ crewName }) => crewName))];
  const rows = shifts.map((shift, index): NamedShiftFigures => {
    const { crewName, hourlyRate = 120, lostFixes = 0, regains = [] } = shift;
    const totals = { ...noTotals(), ...shift.totals };
    const startAt = from + index * 24 * HOUR_MS + 7 * HOUR_MS;
    const crewId = crewIds.indexOf(crewName) + 1;
    return {
      roverId: index + 1,
      roverLabel: `R-0${index + 1}`,
      crewId,
      crewName,
      hourlyRate,
      shiftStart: startAt,
      startAt,
      endAt: startAt + wholeOf(totals),
      day: `2026-09-${28 + index}`,
      week: WEEK,
      basis: 'marks',
      mountPoint: 'TANF00',
      ...totals,
      withinToleranceMs: Math.floor(totals.fixedMs / 2),
      firstFixMs: 61_000,
      lostFixes,
      regains,
    };
  });
  return {
    week: WEEK,
    from,
    to,
    timeZone: ZONE,
    currency: 'AUD',
    firmName: 'Pennywort Surveys',
    isPart: false,
    asOf: to,
    sentence: 'Week 40: as the page says it.',
    total: weekFigures(rows, withMoney),
    fourBefore: { onShiftMs: 100 * HOUR_MS, fixedMs: 90 * HOUR_MS },
    compared: null,
    crews: crewIds.map((crewName, index) => ({
      crewId: index + 1,
      crewName,
      figures: weekFigures(
        rows.filter((row) => row.crewName === crewName),
        withMoney,
      ),
      days: [],
    })),
    weeks: [],
    causes: [],
    mountPoints: [],
    rovers: [],
    shifts: rows.map((row) => weekShiftOf(row, withMoney)),
    profile: topographic,
    ...change,
  };
}
