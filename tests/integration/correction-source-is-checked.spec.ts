import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { CheckRunner } from '@hubtack/backend/corrections/check-runner.js';
import { CorrectionChecksService } from '@hubtack/backend/corrections/correction-checks.service.js';
import { CorrectionWatch } from '@hubtack/backend/corrections/correction-watch.js';
import { LostFixWatch } from '@hubtack/backend/lost-fixes/lost-fix.watch.js';
import type { CorrectionCheck, CorrectionCheckList } from '@hubtack/contracts/corrections/check.js';
import { correctionCheck } from '@hubtack/contracts/corrections/check.js';
import type { CorrectionSource } from '@hubtack/contracts/corrections/correction-source.js';
import type { MountPointList } from '@hubtack/contracts/corrections/mount-point.js';
import type { LostFixList } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { startCaster, type Caster } from '@hubtack/simulators/caster/caster.js';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { quick, testBase, testLogin } from '../harness/check-source.js';
import { postSentences, type Client } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { startServer, type TestServer } from '../harness/server.js';

const S = 1000;
const MINUTE = 60 * S;
const NINE = Date.parse('2026-12-02T09:00:00Z');
let server: TestServer;
let caster: Caster;
let technician: Client;
beforeEach(async () => {
  caster = await startCaster({
    secondMs: 40,
    mountPoints: [
      { name: 'TANF00', stream: { kind: 'msm' }, ...testBase, login: testLogin },
      { name: 'QUARB2', stream: { kind: 'msm' }, ...testBase, latitude: -41.45, login: testLogin },
    ],
  });
  server = await startServer({ CASTER_PRIVATE_ADDRESSES: 'allow' });
  server.app.get(CheckRunner).limits = quick;
  server.clock.set(NINE);
  technician = await server.as('technician');
});
afterEach(async () => {
  await server.close();
  await caster.close();
});

const body = (change: Record<string, unknown> = {}) => ({
  name: 'Tannery base',
  address: '127.0.0.1',
  port: caster.port,
  mountPoint: 'TANF00',
  ...testLogin,
  baseLatitude: null,
  baseLongitude: null,
  ...change,
});
const addSource = (change: Record<string, unknown> = {}) =>
  technician.json<CorrectionSource>('POST', '/api/correction-sources', body(change));
const source = async (id: number) =>
  technician.json<CorrectionSource>('GET', `/api/correction-sources/${id}`);
const settled = () => server.app.get(CorrectionChecksService).settled();
async function check(id: number, of: Record<string, unknown> = {}): Promise<CorrectionCheck> {
  const begun = await technician.json<CorrectionCheck>('POST', `/api/correction-sources/${id}/checks`, of);
  expect(begun.status).toBe('running');
  await settled();
  return correctionCheck.parse(
    await technician.json('GET', `/api/correction-sources/${id}/checks/${begun.id}`),
  );
}

describe('a check', () => {
  it('for a site gives the distance, is kept, and its base position counts on the board', async () => {
    const { id } = await addSource();
    const site = await technician.json<{ id: number }>('POST', '/api/sites', {
      name: 'Mill Race culvert',
      latitude: -41.44,
      longitude: 147.14,
      note: null,
    });
    const done = await check(id, { siteId: site.id });
    expect(done).toMatchObject({
      status: 'done',
      passed: true,
      failedStep: null,
      place: 'Mill Race culvert',
      by: 'technician',
    });
    expect(done.base!.distanceM).toBeGreaterThan(11_000);
    expect(await source(id)).toMatchObject({
      hasPassword: true,
      decodedBase: { stationId: 7, latitude: expect.closeTo(testBase.latitude, 8) },
      lastCheck: { id: done.id, status: 'done', passed: true },
    });
    const { checks } = await technician.json<CorrectionCheckList>(
      'GET',
      `/api/correction-sources/${id}/checks`,
    );
    expect(checks).toHaveLength(1);

    const crewId = await server.makeCrew('Dogwood');
    const rover = await server.makeRover('R-04', crewId);
    await technician.json('PUT', `/api/rovers/${rover.id}`, {
      label: 'R-04',
      receiver: null,
      serial: null,
      correctionSourceId: id,
      retired: false,
    });
    await postSentences(server.url, rover.key, gga(NINE, 4, { latitude: -41.44, longitude: 147.14 }));
    const board = await technician.json<{ lanes: { baseDistanceM: number | null }[] }>('GET', '/api/board');
    expect(board.lanes[0]!.baseDistanceM).toBe(done.base!.distanceM);
  });
  it('is one at a time for a source, and can be cancelled', async () => {
    const { id } = await addSource();
    caster.setFaults('TANF00', { silent: true });
    const path = `/api/correction-sources/${id}/checks`;
    const begun = await technician.json<CorrectionCheck>('POST', path, {});
    const second = await technician.call('POST', path, {});
    expect(second.status).toBe(409);
    expect(await second.text()).toContain('technician is asking this source just now');
    expect((await technician.call('DELETE', `${path}/${begun.id}`)).status).toBe(204);
    await settled();
    expect(await technician.json('GET', `${path}/${begun.id}`)).toMatchObject({
      status: 'cancelled',
      passed: null,
    });
    expect((await technician.call('DELETE', `${path}/${begun.id}`)).status).toBe(409);
  });
  it('that is refused is not asked again until half a minute later, or until the login is another', async () => {
    const { id } = await addSource({ password: 'wrong' });
    expect(await check(id)).toMatchObject({ passed: false, failedStep: 'login' });
    const path = `/api/correction-sources/${id}/checks`;
    const again = await technician.call('POST', path, {});
    expect(again.status).toBe(429);
    expect(again.headers.get('retry-after')).toBe('30');
    expect(caster.requests.filter(({ outcome }) => outcome === 'refused')).toHaveLength(1);
    await technician.json('PUT', `/api/correction-sources/${id}`, body());
    expect(await check(id)).toMatchObject({ passed: true });
  });
  it('private addresses are refused unless whoever runs the server allows them', async () => {
    const strict = await startServer();
    try {
      const other = await strict.as('technician');
      strict.app.get(CheckRunner).limits = quick;
      const { id } = await other.json<{ id: number }>('POST', '/api/correction-sources', body());
      const begun = await other.json<{ id: number }>('POST', `/api/correction-sources/${id}/checks`, {});
      await strict.app.get(CorrectionChecksService).settled();
      const done = await other.json<CorrectionCheck>(
        'GET',
        `/api/correction-sources/${id}/checks/${begun.id}`,
      );
      expect(done).toMatchObject({ failedStep: 'address' });
      expect(caster.requests).toEqual([]);
    } finally {
      await strict.close();
    }
  });
});

describe('a login', () => {
  it('never comes back, and a change of address or port forgets it', async () => {
    const { id } = await addSource();
    const without = { ...body(), password: undefined, mountPoint: 'QUARB2' };
    const kept = await technician.json<CorrectionSource>('PUT', `/api/correction-sources/${id}`, without);
    expect(kept).toMatchObject({ hasPassword: true, mountPoint: 'QUARB2' });
    expect(await check(id)).toMatchObject({ passed: true });
    const moved = { ...without, address: 'localhost' };
    expect(await technician.json('PUT', `/api/correction-sources/${id}`, moved)).toMatchObject({
      hasPassword: false,
    });
    expect(await check(id)).toMatchObject({ failedStep: 'login' });
    for (const path of ['/api/correction-sources', `/api/correction-sources/${id}`, '/api/audit'])
      for (const role of ['technician', 'manager'] as const) {
        const answer = await (await server.as(role)).call('GET', path);
        expect(await answer.text()).not.toContain(testLogin.password);
      }
  });
  it('is not in the database file, nor in its log of pages', async () => {
    const { id } = await addSource();
    await check(id);
    await check(id, {});
    const folder = dirname(server.databaseFile);
    const basic = btoa(`${testLogin.user}:${testLogin.password}`);
    for (const file of readdirSync(folder)) {
      const text = readFileSync(join(folder, file)).toString('latin1');
      expect(text.includes(testLogin.password), file).toBe(false);
      expect(text.includes(basic), file).toBe(false);
    }
  });
  it.each([
    [{ address: 'http://127.0.0.1' }, '/address'],
    [{ address: '127.0.0.1:2101' }, '/address'],
    [{ address: 'a b' }, '/address'],
    [{ mountPoint: '/TANF00' }, '/mountPoint'],
    [{ mountPoint: 'TANF\u200b00' }, '/mountPoint'],
    [{ user: 'a:b' }, '/user'],
    [{ port: 70_000 }, '/port'],
    [{ watchMinutes: 5 }, '/watchMinutes'],
  ])('%j is refused beside its field', async (change, pointer) => {
    const answer = await technician.call('POST', '/api/correction-sources', body(change));
    expect(answer.status).toBe(400);
    const { errors } = (await answer.json()) as { errors: { pointer: string }[] };
    expect(errors.map((error) => error.pointer)).toEqual([pointer]);
  });
});

describe('mount points of a source', () => {
  it('come by distance, and are asked for once a minute', async () => {
    const { id } = await addSource();
    const rover = await server.makeRover('R-04');
    await postSentences(server.url, rover.key, gga(NINE, 4, { latitude: -41.44, longitude: 147.25 }));
    const path = `/api/correction-sources/${id}/mount-points?roverId=${rover.id}`;
    const list = await technician.json<MountPointList>('GET', path);
    expect(list.mountPoints.map(({ mountPoint }) => mountPoint)).toEqual(['QUARB2', 'TANF00']);
    await technician.json('GET', path);
    expect(caster.requests).toHaveLength(1);
    server.clock.advance(61 * S);
    await technician.json('GET', path);
    expect(caster.requests).toHaveLength(2);
  });
  it('of something that is no caster are a problem in words', async () => {
    const { id } = await addSource();
    caster.faults = { webPage: true };
    const answer = await technician.call('GET', `/api/correction-sources/${id}/mount-points`);
    expect(answer.status).toBe(502);
    expect(await answer.json()).toMatchObject({
      code: 'casterProblem',
      detail: expect.stringContaining('web page'),
    });
    // Whoever presses again at once gets the same answer, and the caster is left alone.
    expect((await technician.call('GET', `/api/correction-sources/${id}/mount-points`)).status).toBe(502);
    expect(caster.requests).toHaveLength(1);
  });
});

it('the timetable finds a base down at its second look, and a lost fix of its rover is explained by it', async () => {
  const watch = server.app.get(CorrectionWatch);
  const look = async (minute: number) => {
    server.clock.set(NINE + minute * MINUTE);
    watch.tick();
    await settled();
  };
  const { id } = await addSource({ watchMinutes: 15 });
  const crewId = await server.makeCrew('Dogwood', {
    pattern: [{ weekday: 3, start: '08:00', end: '17:00' }],
  });
  const rover = await server.makeRover('R-04', crewId);
  await technician.json('PUT', `/api/rovers/${rover.id}`, {
    label: 'R-04',
    receiver: null,
    serial: null,
    correctionSourceId: id,
    retired: false,
  });
  await look(0);
  expect(await source(id)).toMatchObject({ lastCheck: { passed: true }, downSince: null });
  await look(1);
  expect(caster.requests).toHaveLength(2);
  caster.setFaults('TANF00', { silent: true });
  await look(15);
  expect(await source(id)).toMatchObject({ lastCheck: { failedStep: 'data' }, downSince: null });
  await look(16);
  expect((await source(id)).downSince).toBe(new Date(NINE + 15 * MINUTE).toISOString());
  const { checks } = await technician.json<CorrectionCheckList>(
    'GET',
    `/api/correction-sources/${id}/checks`,
  );
  expect(checks.map(({ by }) => by)).toEqual([null, null, null]);

  let sentences = '';
  for (let second = 0; second < 180; second++)
    sentences += gga(NINE + 16 * MINUTE + second * S, second < 100 ? 4 : 5, {
      ageSeconds: second < 60 ? 1 : second - 59,
    });
  server.clock.set(NINE + 19 * MINUTE);
  await postSentences(server.url, rover.key, sentences);
  server.app.get(LostFixWatch).sweep();
  const { lostFixes } = await technician.json<LostFixList>('GET', '/api/lost-fixes');
  expect(lostFixes[0]!.diagnosis).toMatchObject({
    cause: 'mountPointDown',
    evidence: [expect.stringContaining('checks of TANF00 find it down'), expect.any(String)],
  });

  caster.setFaults('TANF00', {});
  await look(31);
  expect((await source(id)).downSince).toBeNull();
});
