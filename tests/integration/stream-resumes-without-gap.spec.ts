import type { BoardSnapshot } from '@hubtack/contracts/board/lane.js';
import { lanesEvent, type LanesEvent } from '@hubtack/contracts/stream/events.js';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { postSentences, type TestRover } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { startServer, type TestServer } from '../harness/server.js';
import { StreamReading } from '../harness/stream-reader.js';

let server: TestServer;
let alder: number;
let banksia: number;
let ours: TestRover;
let theirs: TestRover;
let time = 0;

beforeAll(async () => {
  server = await startServer();
  alder = await server.makeCrew('Alder');
  banksia = await server.makeCrew('Banksia');
  ours = await server.makeRover('R-01', alder);
  theirs = await server.makeRover('R-02', banksia);
  time = Math.floor(server.clock.now() / 1000) * 1000;
});
afterAll(() => server.close());

/** A rover reports once, a second later than before. */
const report = async (rover: TestRover, quality = 4) => {
  time += 1000;
  await postSentences(server.url, rover.key, gga(time, quality));
  return time;
};
const snapshot = async (role: 'dispatcher' | 'crewChief' = 'dispatcher') =>
  (await server.as(role, role === 'crewChief' ? alder : undefined)).json<BoardSnapshot>('GET', '/api/board');
const epochsOf = (reading: StreamReading, id: number) =>
  reading.messages
    .filter(({ event }) => event === 'lanes')
    .flatMap(({ data }) => [...(data as LanesEvent).changes, ...(data as LanesEvent).lanes])
    .filter((change) => change.id === id)
    .map(({ lastEpochAt }) => lastEpochAt);
/** A lane says the epoch, as a change or described whole. */
const has =
  (id: number, at: number) =>
  ({ data }: { data: unknown }) => {
    const { changes, lanes } = data as LanesEvent;
    return [...changes, ...lanes].some((lane) => lane.id === id && lane.lastEpochAt === at);
  };

describe('the board stream', () => {
  it('goes on from the snapshot, and every event reads by its contract', async () => {
    const before = await snapshot();
    const reading = await StreamReading.open(await server.as('dispatcher'), { cursor: before.cursor });
    const at = await report(ours);
    const message = await reading.waitFor('lanes', has(ours.id, at));
    expect(lanesEvent.safeParse(message.data).error).toBeUndefined();
    expect(message.id).toMatch(/^[\w-]+\.\d+$/);
    expect(reading.messages[0]!.event).toBe('beat');
    expect(reading.retryMs).toBeGreaterThan(0);
    const { changes, lanes } = message.data as LanesEvent;
    const change = [...changes, ...lanes].find(({ id }) => id === ours.id)!;
    expect(change).toMatchObject({ state: 'fixed', satellites: 22, ageMs: 1000, hdop: 0.7 });
    expect(change.ribbon?.at(-1)).toMatchObject({ state: 'fixed' });
    reading.close();
  });

  it('resumes from Last-Event-ID with all that moved meanwhile, once', async () => {
    const dispatcher = await server.as('dispatcher');
    const first = await StreamReading.open(dispatcher, { cursor: (await snapshot()).cursor });
    const seen = await report(ours);
    const { id } = await first.waitFor('lanes', has(ours.id, seen));
    first.close();
    await report(ours, 5);
    const missed = await report(ours, 5);
    const second = await StreamReading.open(dispatcher, { lastEventId: id! });
    const caughtUp = await second.waitFor('lanes', has(ours.id, missed));
    expect((caughtUp.data as LanesEvent).changes.find((change) => change.id === ours.id)?.state).toBe(
      'float',
    );
    const next = await report(ours);
    await second.waitFor('lanes', has(ours.id, next));
    expect(epochsOf(second, ours.id)).toEqual([missed, next]);
    second.close();
  });

  it.each(['of-another-life.3', 'nonsense', ''])('cursor "%s" is unknown: reset', async (cursor) => {
    const reading = await StreamReading.open(await server.as('dispatcher'), { cursor });
    await reading.waitFor('reset');
    reading.close();
  });

  it('sends a beat after ten seconds of silence', async () => {
    const reading = await StreamReading.open(await server.as('dispatcher'), {
      cursor: (await snapshot()).cursor,
    });
    await reading.waitFor('beat');
    const beats = () => reading.messages.filter(({ event }) => event === 'beat').length;
    const before = beats();
    server.clock.advance(10_100);
    await reading.waitFor('beat', () => beats() > before);
    time += 10_000;
    reading.close();
  });

  it('tells when the clock alone has made a rover silent', async () => {
    const reading = await StreamReading.open(await server.as('dispatcher'), {
      cursor: (await snapshot()).cursor,
    });
    time = Math.floor(server.clock.now() / 1000) * 1000;
    const at = await report(ours);
    await reading.waitFor('lanes', has(ours.id, at));
    server.clock.advance(12_000);
    const isSilent = ({ data }: { data: unknown }) =>
      (data as LanesEvent).changes.some(
        ({ id, state, since }) => id === ours.id && state === 'silent' && since === at + 10_000,
      );
    await reading.waitFor('lanes', isSilent);
    time += 12_000;
    reading.close();
  });
});

describe('who sees what', () => {
  it('a crew chief gets the own crew only, in the snapshot and in the stream', async () => {
    const before = await snapshot('crewChief');
    expect(before.lanes.map(({ crewName }) => crewName)).toEqual(['Alder']);
    const reading = await StreamReading.open(await server.as('crewChief', alder), { cursor: before.cursor });
    await report(theirs);
    const at = await report(ours);
    await reading.waitFor('lanes', has(ours.id, at));
    expect(JSON.stringify(reading.messages)).not.toMatch(/Banksia|R-02/);
    expect(epochsOf(reading, theirs.id)).toEqual([]);
    reading.close();
  });

  it('a rover that changes crew leaves one chief\u2019s board and comes to the other\u2019s', async () => {
    const rover = await server.makeRover('R-03', alder);
    const alders = await StreamReading.open(await server.as('crewChief', alder), {
      cursor: (await snapshot('crewChief')).cursor,
    });
    const other = await server.as('crewChief', banksia);
    const { cursor } = await other.json<BoardSnapshot>('GET', '/api/board');
    const banksias = await StreamReading.open(other, { cursor });
    server.clock.advance(1000);
    await (
      await server.as('manager')
    ).json('POST', `/api/rovers/${rover.id}/assignments`, { crewId: banksia });
    await alders.waitFor('lanes', ({ data }) => (data as LanesEvent).gone.includes(rover.id));
    await banksias.waitFor('lanes', ({ data }) =>
      (data as LanesEvent).lanes.some(({ id }) => id === rover.id),
    );
    alders.close();
    banksias.close();
  });

  it('a changed role ends the stream, and the next one is of the new role', async () => {
    const dispatcher = await server.as('dispatcher');
    const reading = await StreamReading.open(dispatcher, { cursor: (await snapshot()).cursor });
    const manager = await server.as('manager');
    const users = await manager.json<{ id: number; role: string }[]>('GET', '/api/users');
    const { id } = users.find(({ role }) => role === 'dispatcher')!;
    const change = { name: 'dispatcher', active: true };
    await manager.json('PUT', `/api/users/${id}`, { ...change, role: 'crewChief', crewId: banksia });
    await reading.waitForEnd();
    const { lanes } = await dispatcher.json<BoardSnapshot>('GET', '/api/board');
    expect(new Set(lanes.map(({ crewName }) => crewName))).toEqual(new Set(['Banksia']));
    await manager.json('PUT', `/api/users/${id}`, { ...change, role: 'dispatcher', crewId: null });
  });

  it('signing out ends the stream, and coming back is answered 204', async () => {
    const technician = await server.as('technician');
    const reading = await StreamReading.open(technician);
    const cookie = technician.cookieHeader;
    await technician.call('POST', '/api/auth/sign-out');
    await reading.waitForEnd();
    const again = await fetch(new URL('/api/board/stream', server.url), { headers: { cookie } });
    expect(again.status).toBe(204);
  });
});
