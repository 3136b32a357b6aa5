import { FiguresToDo } from '@hubtack/backend/fixes/figures-to-do.repository.js';
import { FiguresKeeper } from '@hubtack/backend/weekly/figures.keeper.js';
import { roverAssignments } from '@hubtack/drizzle/schema/rovers.js';
import { shifts } from '@hubtack/drizzle/schema/shifts.js';
import { spans } from '@hubtack/drizzle/schema/spans.js';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { startServer, type TestServer } from '../harness/server.js';

const HOUR = 3_600_000;
const from = Date.parse('2026-12-02T07:00Z');
const WEEK = '2026-W49';
const path = `/api/weekly.csv?week=${WEEK}`;

let server: TestServer;
beforeAll(async () => {
  server = await startServer();
  server.clock.set(Date.parse('2026-12-04T18:00Z'));
  // Two crews whose times are no round hours, and one name that a spreadsheet would run.
  for (const [name, oddMs] of [
    ['=1+1', 1],
    ['Dogwood', 997],
  ] as const) {
    const crewId = await server.makeCrew(name, { hourlyRate: 100 });
    const { id: roverId } = await server.makeRover(`R-${name.length}`);
    const to = from + 7 * HOUR + oddMs;
    const { database } = server;
    database.insert(roverAssignments).values({ roverId, crewId, startAt: from }).run();
    database.insert(shifts).values({ crewId, startAt: from, endAt: to }).run();
    database
      .insert(spans)
      .values([
        { roverId, state: 'fixed', start: from + 333, end: from + 5 * HOUR + 7 },
        { roverId, state: 'float', start: from + 5 * HOUR + 7, end: from + 6 * HOUR },
      ])
      .run();
    server.app.get(FiguresToDo).add({ roverId, start: from, end: to });
  }
  server.app.get(FiguresKeeper).flush();
});
afterAll(() => server.close());

/** Cells here hold neither quotes nor commas. */
const rowsOf = (csv: string): Record<string, string>[] => {
  const [head, ...lines] = csv.split('\r\n').map((line) => line.split(','));
  return lines.map((line) => Object.fromEntries(head!.map((name, index) => [name, line[index]!])));
};

it('comes as a file that says its week, as UTF-8 with a byte order mark', async () => {
  const answer = await (await server.as('manager')).call('GET', path);
  expect(answer.status).toBe(200);
  expect(answer.headers.get('content-type')).toBe('text/csv; charset=utf-8; header=present');
  expect(answer.headers.get('content-disposition')).toBe(`attachment; filename="fix-time-${WEEK}.csv"`);
  const bytes = new Uint8Array(await answer.arrayBuffer());
  expect(bytes.slice(0, 3)).toEqual(new Uint8Array([0xef, 0xbb, 0xbf]));
});

it('every row adds up, and the rows to their sum, to the millisecond', async () => {
  const rows = rowsOf(await (await (await server.as('manager')).call('GET', path)).text());
  expect(rows.map(({ Crew }) => Crew)).toEqual(["'=1+1", 'Dogwood', '']);
  const ms = (row: Record<string, string>, name: string) => Number(row[`${name} (ms)`]);
  const states = ['Fixed', 'Float', 'Code only', 'No position', 'Quiet'];
  for (const row of rows)
    expect(states.reduce((sum, state) => sum + ms(row, state), 0)).toBe(ms(row, 'On shift'));
  for (const name of ['On shift', ...states])
    expect(ms(rows[0]!, name) + ms(rows[1]!, name)).toBe(ms(rows[2]!, name));
  expect(rows.map((row) => ms(row, 'On shift'))).toEqual([7 * HOUR + 1, 7 * HOUR + 997, 14 * HOUR + 998]);
});

it('money is the manager’s business', async () => {
  const text = async (role: 'manager' | 'dispatcher' | 'technician') =>
    (await (await server.as(role)).call('GET', path)).text();
  expect(await text('manager')).toContain('Cost of paid time without a fix (AUD)');
  for (const role of ['dispatcher', 'technician'] as const) expect(await text(role)).not.toMatch(/cost/i);
});

it.each([
  ['2025-W53', 'There is no week 2025-W53'],
  ['2026-53', 'Write a week such as 2026-W40'],
])('week %s is refused', async (week, detail) => {
  const answer = await (await server.as('manager')).call('GET', `/api/weekly.csv?week=${week}`);
  expect(answer.status).toBe(400);
  expect(await answer.json()).toMatchObject({ code: 'invalidBody', errors: [{ pointer: '/week', detail }] });
});
