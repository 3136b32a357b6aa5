import { siteVisitList, type SiteVisitList } from '@hubtack/contracts/shifts/shift.js';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { postSentences } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { startServer, type TestServer } from '../harness/server.js';

const NINE = Date.parse('2026-12-02T09:00:00Z');
const MINUTE = 60_000;
let server: TestServer;
beforeEach(async () => {
  server = await startServer();
  server.clock.set(NINE);
});
afterEach(() => server.close());

it('a morning at one site and a quarter of an hour at another, of the own crew only', async () => {
  const manager = await server.as('manager');
  const site = (name: string, latitude: number) =>
    manager.json('POST', '/api/sites', { name, latitude, longitude: 147.14, note: null });
  await site('Mill Race culvert', -41.44);
  await site('Quarry Bend haul road', -41.4);
  const crewId = await server.makeCrew('Dogwood');
  const otherId = await server.makeCrew('Echidna');
  const rover = await server.makeRover('R-04', crewId);
  let body = '';
  for (let minute = 0; minute < 120; minute += 0.25)
    if (minute < 60 || minute >= 75)
      body += gga(NINE + minute * MINUTE, 4, {
        latitude: minute < 60 ? -41.4401 : minute < 90 ? -41.4002 : -41.9,
      });
  server.clock.set(NINE + 120 * MINUTE);
  await postSentences(server.url, rover.key, body);
  const path = `/api/crews/${crewId}/visits?date=2026-12-02`;
  const chief = await server.as('crewChief', crewId);
  const visits = siteVisitList.parse(await chief.json<SiteVisitList>('GET', path));
  const at = (ms: number) => (ms - NINE) / MINUTE;
  expect(
    visits.map(({ roverLabel, siteName, start, end }) => [roverLabel, siteName, at(start), at(end)]),
  ).toEqual([
    ['R-04', 'Mill Race culvert', 0, 59.5],
    ['R-04', 'Quarry Bend haul road', 75, 89.5],
  ]);
  const stranger = await server.as('crewChief', otherId);
  expect((await stranger.call('GET', path)).status).toBe(404);
});
