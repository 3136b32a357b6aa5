import { RetentionService } from '@hubtack/backend/operate/retention.service.js';
import { epochs } from '@hubtack/drizzle/schema/epochs.js';
import { isNotNull, eq, and } from 'drizzle-orm';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { postSentences } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { startServer, type TestServer } from '../harness/server.js';
import { timelineOf } from '../harness/timeline.js';

let server: TestServer;
beforeAll(async () => {
  server = await startServer();
});
afterAll(() => server.close());

const iso = (time: number) => new Date(time).toISOString();
const stored = (roverId: number) =>
  server.database.select().from(epochs).where(eq(epochs.roverId, roverId)).all().length;
const placed = (roverId: number) =>
  server.database
    .select()
    .from(epochs)
    .where(and(eq(epochs.roverId, roverId), isNotNull(epochs.latitude)))
    .all().length;

it('raw epochs go with the retention, the timeline stays the same', async () => {
  const rover = await server.makeRover();
  const start = Math.floor(server.clock.now() / 1000) * 1000 - 600_000;
  const text = Array.from({ length: 300 }, (_, second) =>
    gga(start + second * 1000, second < 200 ? 4 : 5),
  ).join('');
  await postSentences(server.url, rover.key, text);
  const manager = await server.as('manager');
  const before = await timelineOf(manager, rover.id, iso(start), iso(start + 300_000));
  const retention = server.app.get(RetentionService);
  await retention.dropOldEpochs();
  expect(stored(rover.id)).toBe(300);
  server.clock.set(start + 15 * 86_400_000);
  await retention.dropOldEpochs();
  server.clock.run();
  expect(stored(rover.id)).toBe(0);
  expect(await timelineOf(manager, rover.id, iso(start), iso(start + 300_000))).toEqual(before);
});

it('positions outside on-shift time are dropped after the day; those on shift stay', async () => {
  const pattern = [1, 2, 3, 4, 5, 6, 7].map((weekday) => ({ weekday, start: '07:00', end: '15:00' }));
  const crewId = await server.makeCrew('Night owls', { pattern });
  const midnight = Math.floor(server.clock.now() / 86_400_000) * 86_400_000;
  // The firm's zone is UTC until somebody says otherwise.
  server.clock.set(midnight);
  const rover = await server.makeRover('R-owl', crewId);
  const at = (hour: number) =>
    Array.from({ length: 10 }, (_, second) => gga(midnight + hour * 3_600_000 + second * 1000)).join('');
  server.clock.set(midnight + 20 * 3_600_000);
  await postSentences(server.url, rover.key, at(9) + at(18));
  expect(placed(rover.id)).toBe(20);
  const retention = server.app.get(RetentionService);
  await retention.dropPositionsOffShift();
  expect(placed(rover.id)).toBe(20);
  server.clock.set(midnight + 30 * 3_600_000);
  await retention.dropPositionsOffShift();
  server.clock.run();
  expect(placed(rover.id)).toBe(10);
  expect(stored(rover.id)).toBe(20);
});
