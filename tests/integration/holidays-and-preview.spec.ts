import { FiguresKeeper } from '@hubtack/backend/weekly/figures.keeper.js';
import type { Preview } from '@hubtack/contracts/weekly/preview.js';
import { preview } from '@hubtack/contracts/weekly/preview.js';
import { defaultLimits } from '@hubtack/contracts/lost-fixes/limits.js';
import { topographic } from '@hubtack/contracts/weekly/tolerance-profile.js';
import { weekly, type Weekly } from '@hubtack/contracts/weekly/weekly.js';
import { roverAssignments } from '@hubtack/drizzle/schema/rovers.js';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { postSentences, type Client } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { startServer, type TestServer } from '../harness/server.js';

const TUESDAY = Date.parse('2026-12-01T08:00:00Z');
const S = 1000;

let server: TestServer;
let manager: Client;
beforeAll(async () => {
  server = await startServer();
  server.clock.set(Date.parse('2026-12-08T12:00:00Z'));
  manager = await server.as('manager');
  const pattern = [{ weekday: 2, start: '08:00', end: '09:00' }];
  const crewId = await server.makeCrew('Alder', { pattern, hourlyRate: 100 });
  const { id, key } = await server.makeRover('R-01');
  server.database.insert(roverAssignments).values({ roverId: id, crewId, startAt: 0 }).run();
  // Half an hour of fixed with HDOP 0.7, twenty minutes with 2.5, and a loss of a minute between.
  let body = '';
  for (let second = 0; second < 3000; second++) {
    const isLost = second >= 1800 && second < 1860;
    body += gga(TUESDAY + second * S, isLost ? 5 : 4, { hdop: second < 1800 ? 0.7 : 2.5 });
  }
  expect((await postSentences(server.url, key, body, '?date=2026-12-01')).status).toBe(200);
  server.app.get(FiguresKeeper).flush();
});
afterAll(() => server.close());

const week = async (): Promise<Weekly> =>
  weekly.parse(await manager.json('GET', '/api/weekly?week=2026-W49'));
const ask = async (change: object): Promise<Preview> =>
  preview.parse(
    await manager.json('POST', '/api/weekly/preview', {
      limits: defaultLimits,
      toleranceProfile: topographic,
      ...change,
    }),
  );
const onShift = async () =>
  Object.values((await week()).total.totals).reduce((sum, ms) => sum + ms, 0) / 60_000;

it('a preview tells what other limits and another profile would make of last week, and changes nothing', async () => {
  const before = await week();
  expect(before.total).toMatchObject({ lostFixes: 2, withinToleranceMs: 1800 * S });
  expect((await ask({})).after).toEqual((await ask({})).before);
  const patient = await ask({ limits: { ...defaultLimits, lostAfterSeconds: 90 } });
  expect([patient.week, patient.before.lostFixes, patient.after.lostFixes]).toEqual(['2026-W49', 2, 1]);
  const lenient = await ask({ toleranceProfile: { ...topographic, maxHdop: 3 } });
  expect(lenient.after.withinToleranceMs).toBe((3000 - 60 + 9) * S);
  expect(await week()).toEqual(before);
});

it('saved, the figures follow', async () => {
  const settings = await manager.json<Record<string, unknown>>('GET', '/api/settings');
  await manager.json('PUT', '/api/settings', {
    ...settings,
    toleranceProfile: { ...topographic, maxHdop: 3 },
  });
  server.app.get(FiguresKeeper).flush();
  expect((await week()).total.withinToleranceMs).toBe((3000 - 60 + 9) * S);
  expect((await week()).profile.maxHdop).toBe(3);
});

it('on a holiday the pattern does not count, also for a day that is past; taken back, it does again', async () => {
  expect(await onShift()).toBe(60);
  await manager.json('PUT', '/api/holidays', [{ day: '2026-12-01', name: 'Regatta Day' }]);
  server.app.get(FiguresKeeper).flush();
  // Without a shift set, what was heard counts: 50 minutes.
  expect(await onShift()).toBeCloseTo(50.15, 2);
  expect((await week()).shifts).toMatchObject([{ basis: 'noShiftSet' }]);
  await manager.json('PUT', '/api/holidays', []);
  server.app.get(FiguresKeeper).flush();
  expect(await onShift()).toBe(60);
  const twice = [
    { day: '2026-12-25', name: 'a' },
    { day: '2026-12-25', name: 'b' },
  ];
  for (const wrong of [twice, [{ day: '2026-02-30', name: 'never' }], [{ day: '2026-12-25', name: '' }]])
    expect((await manager.call('PUT', '/api/holidays', wrong)).status).toBe(400);
  expect((await (await server.as('dispatcher')).call('PUT', '/api/holidays', [])).status).toBe(403);
});
