import { DEMO_CASTER_PASSWORD, DEMO_CASTER_USER } from '@hubtack/drizzle/seeds/demo-accounts.js';
import { demoSources } from '@hubtack/drizzle/seeds/demo-data.js';
import { demoMountPoints } from '@hubtack/simulators/caster/demo-mount-points.js';
import { expect, it } from 'vitest';

/** The simulators may not import the seed, so the two could drift apart: the demo's checks would then find moved bases. */
const served = new Map(demoMountPoints().map((one) => [one.name, one]));

it('every source of the demo is served where the seed says, with its login, but for the mistyped one', () => {
  const missing: string[] = [];
  for (const { mountPoint, baseLatitude, baseLongitude } of demoSources) {
    const found = served.get(mountPoint);
    if (!found) {
      missing.push(mountPoint);
      continue;
    }
    expect(found.login).toEqual({ user: DEMO_CASTER_USER, password: DEMO_CASTER_PASSWORD });
    expect(found.isNetwork === true).toBe(baseLatitude === null);
    if (baseLatitude !== null)
      expect([found.latitude, found.longitude]).toEqual([baseLatitude, baseLongitude]);
  }
  expect(missing).toEqual(['TANF0O']);
});
it('its stations can be told apart', () => {
  const ids = [...served.values()].map(({ stationId }) => stationId);
  expect(new Set(ids).size).toBe(ids.length);
});
