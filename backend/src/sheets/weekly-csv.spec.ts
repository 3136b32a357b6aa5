import Papa from 'papaparse';
import { expect, it } from 'vitest';
import { makeWeekly, type TestShift } from './testing/make-weekly.js';
import { weeklyCsv } from './weekly-csv.js';

const HOUR = 3_600_000;
const shifts: TestShift[] = [
  {
    crewName: 'Alder',
    totals: { fixedMs: 5 * HOUR + 24 * 60_000 + 1, floatMs: 1_234_567, silentMs: 36 * 60_000 - 1 },
    lostFixes: 2,
    regains: [61_000, 120_500],
  },
  { crewName: '=cmd|"x"\r\n,Banksia', totals: { fixedMs: 1, codeMs: 17, noneMs: 999 }, hourlyRate: 99.5 },
  { crewName: '-Dogwood', totals: { silentMs: 7 * HOUR } },
];
const states = ['Fixed', 'Float', 'Code only', 'No position', 'Quiet'];

type Row = Record<string, string>;
const rowsOf = (csv: string): Row[] => {
  const { data, errors } = Papa.parse<Row>(csv.slice(1), { header: true });
  expect(errors).toEqual([]);
  return data;
};

it('read back, it has a row for each rover-shift and their sum', () => {
  const rows = rowsOf(weeklyCsv(makeWeekly(shifts), true));
  expect(rows.map(({ Day }) => Day)).toEqual(['2026-09-28', '2026-09-29', '2026-09-30', 'Total']);
  expect(rows.map(({ Crew }) => Crew)).toEqual(['Alder', '\'=cmd|"x"\r\n,Banksia', "'-Dogwood", '']);
  expect(rows[0]).toMatchObject({
    Week: '2026-W40',
    Rover: 'R-01',
    'Start (Australia/Hobart)': '2026-09-28 07:00:00',
    'Start (UTC)': '2026-09-27T21:00:00.000Z',
    'Fixed (h)': '5.4000',
    'Lost fixes (count)': '2',
    'Time to regain, mean (s)': '90.750',
  });
});

it('states add up to on-shift time exactly in every row, and every row to the sum', () => {
  const rows = rowsOf(weeklyCsv(makeWeekly(shifts), true));
  const ms = (row: Row, name: string) => Number(row[`${name} (ms)`]);
  for (const row of rows)
    expect(states.reduce((sum, state) => sum + ms(row, state), 0)).toBe(ms(row, 'On shift'));
  const total = rows.at(-1)!;
  const counted = ['On shift', ...states, 'Within tolerance', 'Paid time without a fix'];
  for (const name of counted)
    expect(rows.slice(0, -1).reduce((sum, row) => sum + ms(row, name), 0)).toBe(ms(total, name));
  expect(ms(total, 'On shift')).toBeGreaterThan(0);
});

it('a share of nothing, and a length of nothing, are empty and no number', () => {
  const [, , quiet] = rowsOf(weeklyCsv(makeWeekly(shifts), true));
  expect(quiet).toMatchObject({
    'Fix uptime (%)': '0.0',
    'Reporting (%)': '0.0',
    'Fixed while reporting (%)': '',
    'Time to regain, mean (s)': '',
  });
  const [none] = rowsOf(weeklyCsv(makeWeekly([]), true));
  expect(none).toMatchObject({ Day: 'Total', 'On shift (ms)': '0', 'Fix uptime (%)': '' });
});

it('shares keep the display rules: nearly all is not 100, nearly nothing not 0', () => {
  const day = { fixedMs: 8 * HOUR - 1, floatMs: 1 };
  const rows = rowsOf(weeklyCsv(makeWeekly([{ crewName: 'A', totals: day }, shifts[1]!]), true));
  expect(rows[0]!['Fix uptime (%)']).toBe('99.9');
  expect(rows[1]!['Fix uptime (%)']).toBe('0.1');
});

it('money is there for managers only, in the firm’s currency', () => {
  const column = 'Cost of paid time without a fix (AUD)';
  const rows = rowsOf(weeklyCsv(makeWeekly(shifts), true));
  expect(rows[2]![column]).toBe('840.00');
  const csv = weeklyCsv(makeWeekly(shifts, {}, false), false);
  expect(csv).not.toMatch(/cost|AUD/i);
});

it('a shift that runs has no end, and no cost is told of a crew without a rate', () => {
  const weekly = makeWeekly([{ ...shifts[0]!, hourlyRate: null }]);
  const running = weekly.shifts.map((shift) => ({ ...shift, end: null }));
  const [row] = rowsOf(weeklyCsv({ ...weekly, shifts: running }, true));
  expect(row!['End (UTC)']).toBe('');
  expect(row!['Cost of paid time without a fix (AUD)']).toBe('');
});
