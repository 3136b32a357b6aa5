import { LostFixWatch } from '@hubtack/backend/lost-fixes/lost-fix.watch.js';
import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { crewDay } from '@hubtack/contracts/shifts/shift.js';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { postSentences, type Client, type TestRover } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { startServer, type TestServer } from '../harness/server.js';

const at = (clock: string) => Date.parse(`2026-12-02T${clock}Z`);
const iso = (clock: string) => `2026-12-02T${clock}Z`;

let server: TestServer;
let crewId: number;
let rover: TestRover;
let chief: Client;
let dispatcher: Client;
beforeEach(async () => {
  server = await startServer();
  server.clock.set(at('06:00:00'));
  crewId = await server.makeCrew('Dogwood', { pattern: [{ weekday: 3, start: '08:00', end: '16:00' }] });
  rover = await server.makeRover('R-04', crewId);
  chief = await server.as('crewChief', crewId);
  dispatcher = await server.as('dispatcher');
});
afterEach(() => server.close());

const shifts = async () => crewDay.parse(await chief.json('GET', `/api/crews/${crewId}/day`)).shifts;
const step = (name: string, clock: string, options: { key?: string; who?: Client; reason?: string } = {}) =>
  (options.who ?? chief).call(
    'POST',
    `/api/crews/${crewId}/shift/${name}`,
    { at: iso(clock), ...(options.reason ? { reason: options.reason } : {}) },
    options.key === undefined ? {} : { 'idempotency-key': options.key },
  );

describe('a tap that is sent again with its key', () => {
  it('is answered again and counts once', async () => {
    server.clock.set(at('13:00:00'));
    expect((await step('start', '07:10:00', { key: 'tap-1' })).status).toBe(200);
    expect((await step('pause', '11:30:00', { key: 'tap-2', reason: 'lunch' })).status).toBe(200);
    expect((await step('start', '07:10:00', { key: 'tap-1' })).status).toBe(200);
    expect((await step('pause', '11:30:00', { key: 'tap-2', reason: 'lunch' })).status).toBe(200);
    expect(await shifts()).toMatchObject([
      { start: at('07:10:00'), end: null, pauses: [{ start: at('11:30:00'), end: null }] },
    ]);
  });
  it('is refused when the key was used for another step', async () => {
    server.clock.set(at('13:00:00'));
    await step('start', '07:10:00', { key: 'tap-1' });
    const other = await step('finish', '12:00:00', { key: 'tap-1' });
    expect(other.status).toBe(409);
    expect((await shifts())[0]).toMatchObject({ end: null });
  });
  it('is judged anew when it was refused the first time', async () => {
    server.clock.set(at('07:30:00'));
    expect((await step('pause', '07:20:00', { key: 'tap-1', reason: 'other' })).status).toBe(409);
    await step('start', '07:10:00');
    expect((await step('pause', '07:20:00', { key: 'tap-1', reason: 'other' })).status).toBe(200);
  });
  it('has nothing to do with the same key of somebody else', async () => {
    server.clock.set(at('13:00:00'));
    await step('start', '07:10:00', { key: 'tap-1' });
    expect((await step('start', '07:10:00', { key: 'tap-1', who: dispatcher })).status).toBe(409);
  });
});

describe('a tap that contradicts what was marked for later', () => {
  it('does not move the end that somebody has marked', async () => {
    server.clock.set(at('15:30:00'));
    await step('start', '07:10:00');
    await step('finish', '15:20:00', { who: dispatcher });
    const late = await step('finish', '15:00:00');
    expect(late.status).toBe(409);
    expect(await late.json()).toMatchObject({ code: 'conflict', detail: expect.stringContaining('15:20') });
    expect((await shifts())[0]).toMatchObject({ end: at('15:20:00'), endedBy: 'dispatcher' });
  });
  it('an end still to come, set by the office, does not keep the chief from finishing', async () => {
    server.clock.set(at('15:00:00'));
    const marks = { start: iso('07:10:00'), end: iso('16:00:00'), pauses: [] };
    await dispatcher.json('POST', `/api/crews/${crewId}/shifts`, marks);
    expect((await step('finish', '14:50:00')).status).toBe(200);
    expect((await shifts())[0]).toMatchObject({ end: at('14:50:00'), endedBy: 'crewChief' });
  });
  it('does not finish a shift in the middle of a pause that has ended since', async () => {
    server.clock.set(at('13:00:00'));
    await step('start', '07:10:00');
    await step('pause', '11:30:00', { reason: 'lunch' });
    await step('resume', '12:00:00');
    expect((await step('finish', '11:45:00')).status).toBe(409);
    expect((await shifts())[0]).toMatchObject({ end: null });
  });
});

it('marks that take the place of the pattern take away what was raised by the pattern', async () => {
  const reportFixed = async (from: string, to: string) => {
    let body = '';
    for (let time = at(from); time < at(to); time += 5000) body += gga(time, 4);
    server.clock.set(at(to));
    await postSentences(server.url, rover.key, body);
  };
  const endings = async () => {
    server.app.get(LostFixWatch).sweep();
    const { lostFixes } = await dispatcher.json<{ lostFixes: LostFix[] }>(
      'GET',
      '/api/lost-fixes?status=all',
    );
    return lostFixes.filter(({ kind }) => kind === 'lostFix').map(({ ending }) => ending);
  };
  await reportFixed('08:00:00', '08:02:00');
  server.clock.set(at('08:05:00'));
  expect(await endings()).toEqual([null]);
  await reportFixed('08:10:00', '10:00:00');
  expect(await endings()).toEqual(['regained']);
  await step('start', '10:00:00');
  expect(await endings()).toEqual(['withdrawn']);
});
