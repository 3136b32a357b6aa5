import { LostFixWatch } from '@hubtack/backend/lost-fixes/lost-fix.watch.js';
import { FiguresToDo } from '@hubtack/backend/fixes/figures-to-do.repository.js';
import { FiguresKeeper } from '@hubtack/backend/weekly/figures.keeper.js';
import type { Interval } from '@hubtack/backend/common/interval.js';
import { isoWeekInterval, isoWeekOf, localDayOf } from '@hubtack/backend/common/local-day.js';
import { wholeOf } from '@hubtack/contracts/fixes/totals.js';
import { weekly, type Weekly } from '@hubtack/contracts/weekly/weekly.js';
import { roverAssignments } from '@hubtack/drizzle/schema/rovers.js';
import { randomOf, between, chance } from '@hubtack/simulators/scenarios/random.js';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Client, TestRover } from '../harness/client.js';
import { startServer, type TestServer } from '../harness/server.js';
import { until } from '../harness/until.js';

const S = 1000;
const MIN = 60 * S;
const ZONE = 'Australia/Hobart';
const HOLD = 10 * S;
const WEEK_MS = 7 * 86_400_000;
const WEEKS = 200;
const FIRST = isoWeekInterval('2022-W40', ZONE).start;
const END = FIRST + WEEKS * WEEK_MS;

interface TestEpoch {
  time: number;
  quality: number;
  ageSeconds: number | null;
  hdop: number;
  satellites: number;
}
interface TestShift {
  start: number;
  end: number;
  pauses: { start: number; end: number }[];
}

let server: TestServer;
let manager: Client;
let crewId: number;
let rovers: TestRover[];
beforeAll(async () => {
  server = await startServer({ RAW_EPOCH_DAYS: '3000' });
  server.clock.set(END + 3 * WEEK_MS);
  // Lost fixes of four years at every second have no part in this.
  server.app.get(LostFixWatch).beforeApplicationShutdown();
  manager = await server.as('manager');
  const settings = await manager.json<Record<string, unknown>>('GET', '/api/settings');
  await manager.json('PUT', '/api/settings', { ...settings, timeZone: ZONE });
  crewId = await server.makeCrew('Alder', { hourlyRate: 180 });
  rovers = [await server.makeRover('R-01'), await server.makeRover('R-02')];
  for (const { id } of rovers)
    server.database.insert(roverAssignments).values({ roverId: id, crewId, startAt: 0 }).run();
});
afterAll(() => server.close());

/** Shifts that may reach over midnight or over the end of the week, not over each other. */
function shiftsIn(from: number, to: number, random: ReturnType<typeof randomOf>): TestShift[] {
  const list: TestShift[] = [];
  for (let at = from + between(random, 0, 600) * MIN; at < to; at += between(random, 600, 2400) * MIN) {
    const end = at + between(random, 30, 540) * MIN;
    const pauses = [];
    for (let pause = at + between(random, 5, 60) * MIN; pause < end - 40 * MIN; pause += 200 * MIN)
      pauses.push({ start: pause, end: pause + between(random, 5, 30) * MIN });
    list.push({ start: at, end, pauses });
    at = end;
  }
  return list;
}

/** Bursts of epochs with gaps, some of them outside every shift. */
function epochsIn(from: number, to: number, random: ReturnType<typeof randomOf>): TestEpoch[] {
  const list: TestEpoch[] = [];
  for (let at = from; at < to; at += between(random, 60, 1500) * MIN) {
    const count = between(random, 3, 14);
    for (let index = 0; index < count; index++) {
      at += between(random, 300, 14_000);
      const quality = [4, 4, 4, 4, 5, 2, 1, 0][between(random, 0, 7)]!;
      const hdop = between(random, 5, 30) / 10;
      const ageSeconds = chance(random) < 0.1 ? null : between(random, 1, 13);
      list.push({ time: at, quality, ageSeconds, hdop, satellites: between(random, 4, 20) });
    }
  }
  return list;
}

const heardAt = (epochs: readonly TestEpoch[], at: number): TestEpoch | null =>
  epochs
    .filter(({ time }) => time <= at && at < time + HOLD)
    .reduce<TestEpoch | null>((best, epoch) => (best && best.time > epoch.time ? best : epoch), null);

const states = { 4: 'fixed', 5: 'float', 1: 'code', 2: 'code', 0: 'none' } as const;

/** Slow and obvious: at every instant of a local day at which anything can change, look at everything. */
function slowDay(epochs: readonly TestEpoch[], shifts: readonly TestShift[], day: Interval) {
  const edges = new Set([day.start, day.end]);
  for (const { time } of epochs) for (const edge of [time, time + HOLD]) edges.add(edge);
  for (const { start, end, pauses } of shifts)
    for (const edge of [start, end, ...pauses.flatMap((pause) => [pause.start, pause.end])]) edges.add(edge);
  const sorted = [...edges].filter((edge) => edge >= day.start && edge <= day.end).toSorted((a, b) => a - b);
  const pieces = sorted.slice(0, -1).map((start, index) => ({ start, end: sorted[index + 1]! }));
  const isSet = shifts.some((shift) => shift.end > day.start && shift.start < day.end);
  const heard = pieces.filter(({ start }) => heardAt(epochs, start) !== null);
  const isWorked = (at: number) =>
    isSet
      ? shifts.some(
          ({ start, end, pauses }) =>
            start <= at && at < end && !pauses.some((pause) => pause.start <= at && at < pause.end),
        )
      : heard.length > 0 && at >= heard[0]!.start && at < heard.at(-1)!.end;
  const sums = { fixed: 0, float: 0, code: 0, none: 0, silent: 0, within: 0 };
  for (const { start, end } of pieces) {
    if (!isWorked(start)) continue;
    const newest = heardAt(epochs, start);
    sums[newest ? states[newest.quality as keyof typeof states] : 'silent'] += end - start;
    const { ageSeconds } = newest ?? { ageSeconds: null };
    const isGood = ageSeconds !== null && ageSeconds <= 10 && newest!.hdop <= 2 && newest!.satellites >= 6;
    if (newest?.quality === 4 && isGood) sums.within += end - start;
  }
  return sums;
}

const post = (key: string, epochs: readonly unknown[]): Promise<Response> =>
  fetch(`${server.url}/api/ingest/epochs`, {
    method: 'POST',
    headers: { authorization: `Bearer ${key}`, 'content-type': 'application/json' },
    body: JSON.stringify({ epochs }),
  });

const weekOf = async (week: string): Promise<Weekly> =>
  weekly.parse(await manager.json('GET', `/api/weekly?week=${week}`));

it('for 200 random weeks, sentences shuffled: the page’s figures are those of a slow second computation, exactly', async () => {
  const random = randomOf(20_261_201);
  const shifts = shiftsIn(FIRST, END, random);
  for (const { start, end: stop, pauses } of shifts)
    await manager.json('POST', `/api/crews/${crewId}/shifts`, {
      start: new Date(start).toISOString(),
      end: new Date(stop).toISOString(),
      pauses: pauses.map((pause) => ({
        start: new Date(pause.start).toISOString(),
        end: new Date(pause.end).toISOString(),
        reason: 'driving',
      })),
    });
  const heard = rovers.map(() => epochsIn(FIRST, END, random));
  // Weeks in any order, and the sentences of each in any order.
  const weekOrder = Array.from({ length: WEEKS }, (_, number) => number).toSorted(() => chance(random) - 0.5);
  for (const number of weekOrder) {
    const from = FIRST + number * WEEK_MS;
    for (const [index, { key }] of rovers.entries()) {
      const epochs = heard[index]!.filter(({ time }) => time >= from && time < from + WEEK_MS)
        .toSorted(() => chance(random) - 0.5)
        .map((epoch) => ({ ...epoch, time: new Date(epoch.time).toISOString() }));
      expect((await post(key, epochs)).status).toBe(200);
    }
  }
  server.app.get(FiguresKeeper).flush();
  // The connection was let go meanwhile.
  await until(() => weekOf(isoWeekOf(FIRST, ZONE)));

  let compared = 0;
  for (let number = 0; number < WEEKS; number++) {
    const middle = FIRST + (number + 0.5) * WEEK_MS;
    const week = isoWeekOf(middle, ZONE);
    const { start, end: stop } = isoWeekInterval(week, ZONE);
    const page = await weekOf(week);
    const expected = { fixed: 0, float: 0, code: 0, none: 0, silent: 0, within: 0 };
    for (let day = localDayOf(start, ZONE); day.start < stop; day = localDayOf(day.end, ZONE)) {
      for (const epochs of heard) {
        const near = epochs.filter(({ time }) => time > day.start - HOLD && time < day.end);
        const sums = slowDay(near, shifts, day);
        for (const name of Object.keys(expected) as (keyof typeof expected)[]) expected[name] += sums[name];
      }
    }
    const { totals, withinToleranceMs } = page.total;
    expect(
      {
        fixed: totals.fixedMs,
        float: totals.floatMs,
        code: totals.codeMs,
        none: totals.noneMs,
        silent: totals.silentMs,
        within: withinToleranceMs,
      },
      week,
    ).toEqual(expected);
    // Every way of adding up comes to the same.
    const whole = wholeOf(totals);
    const ofCrews = page.crews.flatMap(({ days }) => days).reduce((sum, { onShiftMs }) => sum + onShiftMs, 0);
    const ofRows = page.shifts.reduce((sum, { figures }) => sum + wholeOf(figures.totals), 0);
    expect([ofCrews, ofRows, page.weeks.at(-1)!.onShiftMs], week).toEqual([whole, whole, whole]);
    if (whole > 0) compared++;
  }
  expect(compared).toBeGreaterThan(190);
}, 300_000);

const LATE_WEEK = '2026-W32';

describe('what comes late', () => {
  it('two hours of last Tuesday change Tuesday’s figures at the next look, and nothing else', async () => {
    const { id, key } = await server.makeRover('R-10');
    const lateCrew = await server.makeCrew('Banksia');
    server.database.insert(roverAssignments).values({ roverId: id, crewId: lateCrew, startAt: 0 }).run();
    const monday = isoWeekInterval(LATE_WEEK, ZONE).start;
    const at = (day: number, hour: number) => monday + day * 86_400_000 + hour * 3_600_000;
    for (const day of [0, 1, 2])
      await manager.json('POST', `/api/crews/${lateCrew}/shifts`, {
        start: new Date(at(day, 7)).toISOString(),
        end: new Date(at(day, 15)).toISOString(),
        pauses: [],
      });
    const report = async (from: number, to: number) => {
      const epochs = Array.from({ length: (to - from) / 5000 }, (_, index) => ({
        time: new Date(from + index * 5000).toISOString(),
        quality: 4,
      }));
      expect((await post(key, epochs)).status).toBe(200);
    };
    for (const day of [0, 1, 2]) await report(at(day, 7), at(day, 11));
    server.app.get(FiguresKeeper).flush();
    const fixed = async () =>
      (await weekOf(LATE_WEEK)).crews
        .find(({ crewName }) => crewName === 'Banksia')!
        .days.map(({ fixedMs }) => Math.round(fixedMs / 60_000));
    expect(await fixed()).toEqual([240, 240, 240, 0, 0, 0, 0]);
    const others = (await weekOf(LATE_WEEK)).shifts.filter(({ day }) => !day.endsWith('-04'));
    await report(at(1, 11), at(1, 13));
    // Two hours are worked out again, not everything that came after them.
    const again = server.app.get(FiguresToDo).some(500);
    expect(again.reduce((sum, one) => sum + one.end - one.start, 0)).toBeLessThan(3 * 3_600_000);
    server.app.get(FiguresKeeper).tick(1000);
    expect(await fixed()).toEqual([240, 360, 240, 0, 0, 0, 0]);
    expect((await weekOf(LATE_WEEK)).shifts.filter(({ day }) => !day.endsWith('-04'))).toEqual(others);
    // Once more changes nothing.
    const before = await weekOf(LATE_WEEK);
    server.app.get(FiguresKeeper).addAll(0);
    server.app.get(FiguresKeeper).flush();
    await until(() => weekOf(LATE_WEEK));
    expect(await weekOf(LATE_WEEK)).toEqual(before);
  });
});

it('sentences five minutes old, in order, count as within tolerance though today was looked at meanwhile', async () => {
  const { id, key } = await server.makeRover('R-11');
  const crew = await server.makeCrew('Casuarina');
  server.database.insert(roverAssignments).values({ roverId: id, crewId: crew, startAt: 0 }).run();
  const report = async (from: number, seconds: number) => {
    const epochs = Array.from({ length: seconds / 5 }, (_, index) => ({
      time: new Date(from + index * 5000).toISOString(),
      quality: 4,
      ageSeconds: 1,
      hdop: 0.7,
      satellites: 20,
    }));
    expect((await post(key, epochs)).status).toBe(200);
  };
  const noon = server.clock.now();
  await report(noon - 60 * S, 60);
  const look = () => server.app.get(FiguresKeeper).flush();
  server.clock.set(noon + 5 * MIN);
  look();
  await report(noon, 290);
  look();
  const [row] = (await weekOf(isoWeekOf(noon, ZONE))).crews.filter(
    ({ crewName }) => crewName === 'Casuarina',
  );
  expect(row?.figures.withinToleranceMs).toBe(355 * S);
});

describe('what is asked wrongly', () => {
  it.each(['2025-W53', '2026-W00', '2026-40', 'now'])('%s is no week', async (week) => {
    const answer = await manager.call('GET', `/api/weekly?week=${week}`);
    expect(answer.status).toBe(400);
    expect(await answer.json()).toMatchObject({ errors: [{ pointer: '/week' }] });
  });
  it('2026-W53 is one; money is the manager’s', async () => {
    expect((await weekOf('2026-W53')).from).toBe(Date.parse('2026-12-27T13:00:00Z'));
    const dispatcher = await server.as('dispatcher');
    const page = weekly.parse(await dispatcher.json('GET', '/api/weekly?week=2023-W01'));
    expect(page.total.cost).toBeNull();
    expect((await weekOf('2023-W01')).total.cost).toBeGreaterThan(0);
  });
});
