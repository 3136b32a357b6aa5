import { FiguresKeeper } from '@hubtack/backend/weekly/figures.keeper.js';
import type { Crew } from '@hubtack/contracts/crews/crew.js';
import type { ShownSettings } from '@hubtack/contracts/settings/settings.js';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { postSentences, type Client, type TestRover } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { startServer, type TestServer } from '../harness/server.js';

const S = 1000;
/** A Wednesday, 09:00 in the zone of the tests (UTC). */
const NINE = Date.parse('2026-12-02T09:00:00Z');
const allDay = [{ weekday: 3, start: '09:00', end: '10:00' }];
const control = { name: 'control', maxAgeSeconds: 2, maxHdop: 1, minSatellites: 10 };

let server: TestServer;
let manager: Client;
let crewId: number;
let rover: TestRover;
beforeEach(async () => {
  server = await startServer();
  server.clock.set(NINE);
  manager = await server.as('manager');
  crewId = await server.makeCrew('Dogwood', { pattern: allDay });
  rover = await server.makeRover('R-04', crewId);
  // Ten minutes well within the firm's profile, the second half beyond the other.
  let body = '';
  for (let second = 0; second < 600; second++)
    body += gga(NINE + second * S, 4, { ageSeconds: second < 300 ? 1 : 5 });
  server.clock.set(NINE + 3600 * S);
  await postSentences(server.url, rover.key, body);
});
afterEach(() => server.close());

const settings = () => manager.json<ShownSettings>('GET', '/api/settings');
async function save(otherProfiles: unknown[]): Promise<Response> {
  const { rawEpochDays: _days, ...current } = await settings();
  return manager.call('PUT', '/api/settings', { ...current, otherProfiles });
}
async function choose(toleranceProfile: string | null): Promise<void> {
  const { name, phone, siteId, hourlyRate, pattern, active } = await manager.json<Crew>(
    'GET',
    `/api/crews/${crewId}`,
  );
  await manager.json('PUT', `/api/crews/${crewId}`, {
    name,
    phone,
    siteId,
    hourlyRate,
    pattern,
    active,
    toleranceProfile,
  });
}
async function withinMs(): Promise<number> {
  server.app.get(FiguresKeeper).flush();
  const week = await manager.json<{ total: { withinToleranceMs: number } }>(
    'GET',
    '/api/weekly?week=2026-W49',
  );
  return week.total.withinToleranceMs;
}

it('the time of a crew is judged by its own profile once it has one, past days included, and by the firm’s again without', async () => {
  // Held for ten seconds after the last epoch.
  expect(await withinMs()).toBe(609 * S);
  expect((await save([control])).status).toBe(200);
  expect(await withinMs()).toBe(609 * S);
  await choose('control');
  expect(await withinMs()).toBe(300 * S);
  const start = await manager.json<{ toleranceProfile: string; profiles: string[] }>(
    'GET',
    `/api/set-up-cards/start?roverId=${rover.id}`,
  );
  expect(start).toMatchObject({ toleranceProfile: 'control', profiles: ['topographic', 'control'] });
  // Another limit of the profile counts at once; a profile that is gone leaves the firm's.
  await save([{ ...control, maxAgeSeconds: 8 }]);
  expect(await withinMs()).toBe(609 * S);
  await save([control]);
  expect(await withinMs()).toBe(300 * S);
  await save([]);
  expect(await withinMs()).toBe(609 * S);
});

it.each([
  [[control, control], '/otherProfiles'],
  [[{ ...control, name: 'topographic' }], '/otherProfiles/0/name'],
  [[{ ...control, minSatellites: 2 }], '/otherProfiles/0/minSatellites'],
])('%j is refused beside its field', async (profiles, pointer) => {
  const answer = await save(profiles);
  expect(answer.status).toBe(400);
  expect(await answer.json()).toMatchObject({ errors: [{ pointer }] });
});
