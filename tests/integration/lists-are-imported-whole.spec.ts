import type { ControlPoint } from '@hubtack/contracts/control-points/control-point.js';
import type { Crew } from '@hubtack/contracts/crews/crew.js';
import type { ImportPreview } from '@hubtack/contracts/imports/import.js';
import type { Site } from '@hubtack/contracts/sites/site.js';
import { afterAll, beforeAll, expect, it } from 'vitest';
import type { Client } from '../harness/client.js';
import { startServer, type TestServer } from '../harness/server.js';

let server: TestServer;
let technician: Client;
beforeAll(async () => {
  server = await startServer();
  technician = await server.as('technician');
});
afterAll(() => server.close());

const preview = (kind: string, text: string) =>
  technician.json<ImportPreview>('POST', `/api/imports/${kind}/preview`, { text });
const siteNames = async () => (await technician.json<Site[]>('GET', '/api/sites')).map(({ name }) => name);

it('sites, then crews on them, then control points; a preview changes nothing', async () => {
  const sites = 'name,latitude,longitude\n"Quarry, north",47.5,8.25\nBank,-33.5,151\n';
  const first = await preview('sites', sites);
  expect(first.rows.map(({ action }) => action)).toEqual(['add', 'add']);
  expect(await siteNames()).toEqual([]);
  const { fingerprint } = first;
  expect(await technician.json('POST', '/api/imports/sites', { text: sites, fingerprint })).toEqual({
    added: 2,
    changed: 0,
  });
  expect(await siteNames()).toEqual(['Bank', 'Quarry, north']);
  expect((await preview('sites', sites)).rows.map(({ action }) => action)).toEqual(['same', 'same']);

  const crews = 'name;site;days;start;end\nAlder;bank;Mon-Fri;7:00;15:00\n';
  await technician.json('POST', '/api/imports/crews', {
    text: crews,
    fingerprint: (await preview('crews', crews)).fingerprint,
  });
  const [alder] = await technician.json<Crew[]>('GET', '/api/crews');
  expect(alder).toMatchObject({ name: 'Alder', siteName: 'Bank' });
  expect(alder!.pattern).toHaveLength(5);

  const points = 'name\tlatitude\tlongitude\theight\theight kind\nM1\t47.5\t8.25\t410.5\tgeoid\n';
  await technician.json('POST', '/api/imports/control-points', {
    text: points,
    fingerprint: (await preview('control-points', points)).fingerprint,
  });
  expect(await technician.json<ControlPoint[]>('GET', '/api/control-points')).toMatchObject([
    { name: 'M1', height: 410.5, heightKind: 'geoid' },
  ]);
  const manager = await server.as('manager');
  const { entries } = await manager.json<{ entries: object[] }>('GET', '/api/audit');
  expect(entries).toContainEqual(expect.objectContaining({ action: 'controlPoint.added', subject: 'M1' }));
});

it('one wrong row, and nothing is imported', async () => {
  const text = 'name,latitude\nGood,1\nBad,100\n';
  const { rows, fingerprint } = await preview('sites', text);
  expect(rows[1]!.errors).toEqual([{ column: 'latitude', detail: 'Between -90 and 90' }]);
  const answer = await technician.call('POST', '/api/imports/sites', { text, fingerprint });
  expect(answer.status).toBe(400);
  expect(await answer.json()).toMatchObject({ detail: 'Row 3 is wrong; nothing was imported.' });
  expect(await siteNames()).not.toContain('Good');
});

it('what has changed since the preview is looked at again first', async () => {
  const text = 'name,note\nGravel pit,ours\n';
  const { fingerprint } = await preview('sites', text);
  await technician.json('POST', '/api/sites', {
    name: 'Gravel pit',
    latitude: null,
    longitude: null,
    note: 'theirs',
  });
  const answer = await technician.call('POST', '/api/imports/sites', { text, fingerprint });
  expect(answer.status).toBe(409);
  const sites = await technician.json<Site[]>('GET', '/api/sites');
  expect(sites.find(({ name }) => name === 'Gravel pit')?.note).toBe('theirs');
});

it.each([
  ['sites', 'name,lat\nA,1', 400, 'There is no column "lat"'],
  ['sites', '', 400, 'The list is empty'],
  ['sites', `name,note\n${'A,\n'.repeat(50_000)}`, 400, 'at most 5000 rows, this one has 50000'],
  ['rovers', 'name\nA', 400, ''],
])('%#: %s, a list that cannot be used is refused with a reason', async (kind, text, status, words) => {
  const answer = await technician.call('POST', `/api/imports/${kind}/preview`, { text });
  expect(answer.status).toBe(status);
  expect(JSON.stringify(await answer.json())).toContain(words.replaceAll('"', String.raw`\"`));
});

it('2,000 sites in one list', async () => {
  const text = `name,latitude,longitude\n${Array.from({ length: 2000 }, (_, n) => `Lot ${n},${n / 100},8`).join('\n')}`;
  const { fingerprint } = await preview('sites', text);
  expect(await technician.json('POST', '/api/imports/sites', { text, fingerprint })).toEqual({
    added: 2000,
    changed: 0,
  });
});

it('a crew without days of its own begins with the firm’s working week; crews that are there keep theirs', async () => {
  const manager = await server.as('manager');
  const settings = await manager.json<Record<string, unknown>>('GET', '/api/settings');
  const workingWeek = [{ weekday: 6, start: '09:00', end: '12:00' }];
  await manager.json('PUT', '/api/settings', { ...settings, workingWeek });
  const text = 'name\nBanksia\nAlder\n';
  const { fingerprint } = await preview('crews', text);
  await technician.json('POST', '/api/imports/crews', { text, fingerprint });
  const crews = await technician.json<Crew[]>('GET', '/api/crews');
  expect(crews.find(({ name }) => name === 'Banksia')?.pattern).toEqual(workingWeek);
  expect(crews.find(({ name }) => name === 'Alder')?.pattern).toHaveLength(5);
  const doubled = [workingWeek[0], workingWeek[0]];
  const answer = await manager.call('PUT', '/api/settings', { ...settings, workingWeek: doubled });
  expect(answer.status).toBe(400);
  expect(await answer.json()).toMatchObject({
    errors: [{ pointer: '/workingWeek', detail: 'One line for each weekday' }],
  });
});
