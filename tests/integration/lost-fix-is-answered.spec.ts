import { LostFixWatch } from '@hubtack/backend/lost-fixes/lost-fix.watch.js';
import type { LostFix, LostFixDetail } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { postSentences, type Client, type TestRover } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { startServer, type TestServer } from '../harness/server.js';

const S = 1000;
const MIN = 60 * S;
const NINE = Date.parse('2026-12-02T09:00:00Z');

let server: TestServer;
let crewId: number;
let rover: TestRover;
let dispatcher: Client;
let technician: Client;
let chief: Client;
beforeEach(async () => {
  server = await startServer();
  server.clock.set(NINE);
  crewId = await server.makeCrew('Dogwood', { pattern: [{ weekday: 3, start: '08:00', end: '17:00' }] });
  rover = await server.makeRover('R-04', crewId);
  dispatcher = await server.as('dispatcher');
  technician = await server.as('technician');
  chief = await server.as('crewChief', crewId);
});
afterEach(() => server.close());

async function report(from: number, to: number, quality: number): Promise<void> {
  let body = '';
  for (let second = from; second < to; second++) body += gga(NINE + second * S, quality);
  server.clock.set(NINE + to * S);
  await postSentences(server.url, rover.key, body);
  server.app.get(LostFixWatch).sweep();
}
function sweepAt(at: number): void {
  server.clock.set(at);
  server.app.get(LostFixWatch).sweep();
}
async function lose(): Promise<number> {
  await report(0, 60, 4);
  await report(60, 95, 5);
  return (await get()).id;
}
const list = async (who: Client = dispatcher, status = 'all') =>
  (await who.json<{ lostFixes: LostFix[] }>('GET', `/api/lost-fixes?status=${status}`)).lostFixes;
const get = async () => (await list())[0]!;
const detail = (id: number, who: Client = dispatcher) =>
  who.json<LostFixDetail>('GET', `/api/lost-fixes/${id}`);
const post = (id: number, what: string, body?: unknown, who: Client = dispatcher) =>
  who.call('POST', `/api/lost-fixes/${id}/${what}`, body);
const flag = (word: string, more: Record<string, unknown> = {}, headers: Record<string, string> = {}) =>
  chief.call('POST', '/api/lost-fixes', { roverId: rover.id, word, note: null, ...more }, headers);

describe('taking', () => {
  it('the second is told who has it; handing over moves it', async () => {
    const id = await lose();
    expect((await post(id, 'take')).status).toBe(200);
    expect((await post(id, 'take')).status).toBe(200);
    const second = await post(id, 'take', undefined, technician);
    expect(second.status).toBe(409);
    expect(await second.json()).toMatchObject({ code: 'conflict', detail: 'dispatcher has it.' });
    const people = await dispatcher.json<{ id: number; name: string }[]>('GET', '/api/lost-fixes/people');
    expect(people.map(({ name }) => name)).toEqual(['dispatcher', 'manager', 'technician']);
    const userId = people.find(({ name }) => name === 'technician')!.id;
    expect((await post(id, 'hand-over', { userId })).status).toBe(200);
    expect(await get()).toMatchObject({ status: 'taken', taken: { by: 'technician' } });
    expect((await detail(id)).history.map(({ kind, by }) => [kind, by])).toEqual([
      ['raised', null],
      ['taken', 'dispatcher'],
      ['handedOver', 'dispatcher'],
    ]);
  });
  it('cannot be handed to a chief, or to nobody', async () => {
    const id = await lose();
    const chiefId = (
      await (await server.as('manager')).json<{ id: number; role: string }[]>('GET', '/api/users')
    ).find(({ role }) => role === 'crewChief')!.id;
    for (const userId of [chiefId, 9999]) {
      const answer = await post(id, 'hand-over', { userId });
      expect(answer.status).toBe(400);
      expect(await answer.json()).toMatchObject({ errors: [{ pointer: '/userId' }] });
    }
  });
});

describe('advice', () => {
  it('reaches the chief, and takes what nobody has', async () => {
    const id = await lose();
    expect((await post(id, 'advice', { text: 'Move into the open' })).status).toBe(200);
    const [own] = await list(chief);
    expect(own).toMatchObject({
      status: 'taken',
      advice: { text: 'Move into the open', by: 'dispatcher' },
    });
    expect((await post(id, 'advice', { text: '  ' })).status).toBe(400);
  });
});

describe('closing', () => {
  it('keeps the confirmed cause and the note beside what was said at raising', async () => {
    const id = await lose();
    await report(95, 130, 4);
    expect((await post(id, 'close', { cause: 'skyBlocked', note: 'Tree cover, moved setup' })).status).toBe(
      200,
    );
    expect(await get()).toMatchObject({
      status: 'closed',
      endAt: NINE + 95 * S,
      closed: { cause: 'skyBlocked', note: 'Tree cover, moved setup', by: 'dispatcher' },
      diagnosisAtRaising: { cause: 'notResolving' },
      diagnosis: { cause: 'notResolving' },
    });
    const again = await post(id, 'close', { cause: 'equipment', note: null }, technician);
    expect(again.status).toBe(409);
    expect(await again.json()).toMatchObject({ detail: 'It was closed by dispatcher.' });
    expect(await list(dispatcher, 'active')).toEqual([]);
  });
  it('late sentences correct the figures of a closed one, and leave what people said', async () => {
    const id = await lose();
    await report(95, 130, 4);
    await post(id, 'close', { cause: 'planned', note: null });
    let body = '';
    for (let second = 60; second < 70; second++) body += gga(NINE + second * S + 500, 4);
    await postSentences(server.url, rover.key, body);
    sweepAt(NINE + 131 * S);
    const history = (await detail(id)).history.map(({ kind }) => kind);
    expect(history).toContain('closed');
    expect(await get()).toMatchObject({ status: 'closed', closed: { cause: 'planned' } });
  });
});

describe('a chief’s flag', () => {
  it('belongs to the loss that is there', async () => {
    const id = await lose();
    const answer = await flag('underCover', { note: 'big gum tree' });
    expect(answer.status).toBe(201);
    expect(await answer.json()).toMatchObject({
      id,
      kind: 'lostFix',
      flag: { word: 'underCover', note: 'big gum tree', by: 'crewChief' },
    });
    expect(await list()).toHaveLength(1);
  });
  it('made before the loss has lasted half a minute becomes that loss when it is raised', async () => {
    await report(0, 60, 4);
    await report(60, 75, 5);
    expect(await (await flag('noCorrections')).json()).toMatchObject({ kind: 'flag', status: 'open' });
    await report(75, 95, 5);
    expect(await list()).toMatchObject([
      { kind: 'lostFix', startAt: NINE + 60 * S, flag: { word: 'noCorrections' } },
    ]);
  });
  it('that nothing comes of ends when the fix holds; one that says the fix looks wrong, only by a person', async () => {
    await report(0, 60, 4);
    const { id } = (await (await flag('noMobileSignal')).json()) as LostFix;
    await report(60, 80, 4);
    expect(await get()).toMatchObject({ id, status: 'ended', ending: 'regained' });
    const wrong = (await (await flag('fixLooksWrong', { note: '60 mm off at CP 3' })).json()) as LostFix;
    await report(80, 180, 4);
    sweepAt(Date.parse('2026-12-02T18:00:00Z'));
    const looksWrong = (await list()).find((one) => one.id === wrong.id)!;
    expect(looksWrong).toMatchObject({ status: 'open', endAt: null });
    await post(wrong.id, 'close', { cause: 'equipment', note: null });
    expect((await list()).find((one) => one.id === wrong.id)).toMatchObject({
      status: 'closed',
      ending: 'person',
    });
  });
  it('sent again with the same key counts once; the key for something else is refused', async () => {
    await report(0, 60, 4);
    const key = { 'idempotency-key': '5f1d0f8e-7c57-4b39-a0d5-0d3c1a3b1c11' };
    const first = (await (await flag('underCover', {}, key)).json()) as LostFix;
    const second = (await (await flag('underCover', {}, key)).json()) as LostFix;
    expect(second).toEqual(first);
    expect(await list()).toHaveLength(1);
    expect((await detail(first.id)).history.filter(({ kind }) => kind === 'flagged')).toHaveLength(1);
    const step = await chief.call('POST', `/api/crews/${crewId}/shift/start`, {}, key);
    expect(step.status).toBe(409);
  });
  it('keeps the time of the tap; a clock that is ahead means now; one that is days off is refused', async () => {
    await report(0, 60, 4);
    await report(60, 70, 4);
    const tapped = new Date(NINE + 20 * S).toISOString();
    expect(await (await flag('underCover', { at: tapped })).json()).toMatchObject({
      flag: { at: NINE + 20 * S },
    });
    const ahead = await flag('underCover', { at: '2026-12-02T10:00:00Z' });
    expect(((await ahead.json()) as LostFix).flag!.at).toBe(server.clock.now());
    for (const at of ['2026-12-04T10:00:00Z', '2026-11-30T20:00:00Z'])
      expect((await flag('underCover', { at })).status, at).toBe(400);
  });
});

describe('the shelf', () => {
  it('brings it back by itself, with who and why', async () => {
    const id = await lose();
    await report(95, 100, 5);
    expect((await post(id, 'shelve', { minutes: 30, reason: 'waiting for the operator' })).status).toBe(200);
    const until = NINE + 100 * S + 30 * MIN;
    expect(await get()).toMatchObject({
      shelved: { until, by: 'dispatcher', reason: 'waiting for the operator' },
    });
    sweepAt(until - 1);
    expect((await get()).shelved).not.toBeNull();
    sweepAt(until);
    expect((await get()).shelved).toBeNull();
    expect((await detail(id)).history.at(-1)).toMatchObject({ kind: 'backFromShelf', by: null });
    expect((await post(id, 'shelve', { minutes: 481, reason: 'x' })).status).toBe(400);
  });
});
