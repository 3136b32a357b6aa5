import { ecefOf, geodeticOf } from '@hubtack/contracts/geodesy/ecef.js';
import { defaultCheckShotLimits } from '@hubtack/contracts/set-up/check-shot-limits.js';
import { array, assert, double, property } from 'fast-check';
import { describe, expect, it } from 'vitest';
import { meanPosition } from './mean-position.js';
import { groundOfMean, groundOfTyped, shotResult } from './shot-result.js';

const point = { latitude: -41.44, longitude: 147.14, height: 35.107, heightKind: 'ellipsoidal' } as const;
const pole = {
  poleHeightM: 1.8,
  measuringPoint: 'mountBottom',
  antennaOffsetM: 0.093,
  tilt: 'calibrated',
} as const;
/** Degrees that are so many metres east and north of the control point. */
function beside(eastM: number, northM: number): { latitude: number; longitude: number } {
  const phi = (point.latitude * Math.PI) / 180;
  const lambda = (point.longitude * Math.PI) / 180;
  const at = ecefOf({ ...point, heightM: 0 });
  const { latitude, longitude } = geodeticOf({
    x: at.x - Math.sin(lambda) * eastM - Math.sin(phi) * Math.cos(lambda) * northM,
    y: at.y + Math.cos(lambda) * eastM - Math.sin(phi) * Math.sin(lambda) * northM,
    z: at.z + Math.cos(phi) * northM,
  });
  return { latitude, longitude };
}
const epoch = (eastM: number, northM: number, altitudeM = 40, time = 0) => ({
  time,
  ...beside(eastM, northM),
  altitudeM,
  geoidSeparationM: -3,
});
const resultOf = (
  epochs: ReturnType<typeof epoch>[],
  of: { pole?: typeof pole | null; point?: Parameters<typeof groundOfMean>[2] } = {},
) => {
  const mean = meanPosition(epochs)!;
  const by = of.pole === undefined ? pole : of.pole;
  const against = of.point ?? point;
  return shotResult(groundOfMean(mean, by, against), mean, by, against, defaultCheckShotLimits);
};

describe('a check shot', () => {
  it('is the rover minus the control point: east, north and up', () => {
    const result = resultOf([epoch(0.008, -0.004, 40.012)]);
    expect(result.difference.eastM).toBeCloseTo(0.008, 5);
    expect(result.difference.northM).toBeCloseTo(-0.004, 5);
    expect(result.difference.upM).toBeCloseTo(0.012, 5);
    expect(result.horizontalM).toBeCloseTo(0.00894, 5);
    expect(result).toMatchObject({ passed: true, poleHeightM: 1.893, warnings: [] });
  });
  it('counts heights as the control point does', () => {
    const geoid = { ...point, height: 38.107, heightKind: 'geoid' } as const;
    expect(resultOf([epoch(0, 0, 40.02)], { point: geoid }).difference.upM).toBeCloseTo(0.02, 5);
  });
  it.each([
    [0.0299, 0, 40, true],
    [0.0301, 0, 40, false],
    [0, 0, 40.0499, true],
    [0, 0, 39.9499, false],
  ])('%f m east, %f m north, %f m of altitude: passed %s', (east, north, altitude, passed) => {
    expect(resultOf([epoch(east, north, altitude)]).passed).toBe(passed);
  });
  it('a pole height that is wrong by the usual 20 cm fails in height', () => {
    const result = resultOf([epoch(0, 0)], { pole: { ...pole, poleHeightM: 2 } as unknown as typeof pole });
    expect(result.difference.upM).toBeCloseTo(-0.2, 5);
    expect(result.passed).toBe(false);
    expect(result.warnings).toEqual([expect.stringContaining('read pole height')]);
  });
  it('of a leaning pole says so, whether or not there is a height', () => {
    const leaning = { ...pole, tilt: 'notCalibrated' } as unknown as typeof pole;
    expect(resultOf([epoch(0, 0)], { pole: leaning, point: { ...point, height: null } }).warnings).toContain(
      'Tilt compensation is on and not calibrated.',
    );
  });
  it('without a card, or a height to compare with, checks the plan and says so', () => {
    expect(resultOf([epoch(0, 0, 99)], { pole: null })).toMatchObject({
      passed: true,
      difference: { upM: null },
      warnings: expect.arrayContaining(['There is no set-up card of today: the height is not compared.']),
    });
    expect(resultOf([epoch(0, 0, 99)], { point: { ...point, height: null } }).warnings).toContain(
      'The control point has no height: the plan alone is checked.',
    );
  });
  it('typed values are on the ground already; another kind of height is not compared', () => {
    const typed = { from: 'typed', ...beside(0.01, 0), heightM: 35.117, heightKind: 'ellipsoidal' } as const;
    const like = shotResult(groundOfTyped(typed, point), null, pole, point, defaultCheckShotLimits);
    expect(like.difference.upM).toBeCloseTo(0.01, 5);
    expect(like).toMatchObject({ epochs: null, poleHeightM: null, scatter: null });
    const other = groundOfTyped({ ...typed, heightKind: 'geoid' }, point);
    expect(other.heightM).toBeNull();
    expect(other.warnings[0]).toContain('above the ellipsoid');
    expect(groundOfTyped({ ...typed, heightM: null }, point).warnings[0]).toContain('No height was typed');
  });
});

describe('the mean of some epochs', () => {
  it('and their scatter, in metres', () => {
    const found = meanPosition([epoch(-0.01, 0, 40.01), epoch(0.01, 0, 39.99), epoch(0, 0.03, 40)])!;
    const result = resultOf([epoch(-0.01, 0, 40.01), epoch(0.01, 0, 39.99), epoch(0, 0.03, 40)]);
    expect(result.difference.eastM).toBeCloseTo(0, 6);
    expect(result.difference.northM).toBeCloseTo(0.01, 6);
    expect(found.scatter!.eastM).toBeCloseTo(0.01, 5);
    expect(found.scatter!.northM).toBeCloseTo(Math.sqrt(0.0003), 5);
    expect(found.scatter!.upM).toBeCloseTo(0.01, 9);
  });
  it('does not depend on their order, nor on where on earth they are', () => {
    const offset = double({ min: -0.05, max: 0.05, noNaN: true });
    assert(
      property(array(offset, { minLength: 2, maxLength: 12 }), (offsets) => {
        const list = offsets.map((east) => epoch(east, -east, 40 + east));
        const forward = meanPosition(list)!;
        const backward = meanPosition(list.toReversed())!;
        expect(backward.latitude).toBeCloseTo(forward.latitude, 12);
        expect(backward.scatter!.eastM).toBeCloseTo(forward.scatter!.eastM, 9);
        const average = offsets.reduce((sum, east) => sum + east, 0) / offsets.length;
        expect(resultOf(list).difference.eastM).toBeCloseTo(average, 6);
      }),
    );
  });
  it('is a place on the same side of the earth where longitudes jump from 180 to -180', () => {
    const found = meanPosition(
      [179.9999999, -179.9999998].map((longitude) => ({ ...epoch(0, 0), longitude })),
    )!;
    expect(found.longitude).toBeCloseTo(-179.99999995, 9);
    expect(found.scatter!.eastM).toBeLessThan(0.1);
  });
  it('there is none without a position', () => {
    expect(meanPosition([])).toBeNull();
    expect(meanPosition([{ ...epoch(0, 0), latitude: null }])).toBeNull();
    expect(meanPosition([{ ...epoch(0, 0), altitudeM: null }])!.altitudeM).toBeNull();
  });
});
