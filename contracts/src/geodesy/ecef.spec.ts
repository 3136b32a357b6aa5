import { assert, integer, property } from 'fast-check';
import { expect, it } from 'vitest';
import { ecefOf, geodeticOf } from './ecef.js';

/** Evenly spread, which doubles of fast-check are not: most of those are next to nothing. */
const between = (least: number, most: number, digits: number) =>
  integer({ min: least * 10 ** digits, max: most * 10 ** digits }).map((whole) => whole / 10 ** digits);

it('there and back is the same place to a hundredth of a millimetre, at the poles as well', () => {
  const latitude = between(-90, 90, 9);
  const longitude = between(-179, 180, 9);
  // As high as message 1005 can say.
  const heightM = between(-12_000, 7_000_000, 4);
  assert(
    property(latitude, longitude, heightM, (phi, lambda, h) => {
      const there = ecefOf({ latitude: phi, longitude: lambda, heightM: h });
      const back = ecefOf(geodeticOf(there));
      expect(Math.hypot(back.x - there.x, back.y - there.y, back.z - there.z)).toBeLessThan(1e-5);
      expect(geodeticOf(there).heightM).toBeCloseTo(h, 5);
    }),
    {
      numRuns: 1000,
      examples: [
        [90, 0, 0],
        [-90, 12, 100],
        [0, 180, -10],
        [89.9999999, 45, 5],
      ],
    },
  );
});

it('whatever a base says of itself, its latitude is one', () => {
  const anywhere = between(-13_743_895, 13_743_895, 4);
  assert(
    property(anywhere, anywhere, anywhere, (x, y, z) => {
      const { latitude, longitude, heightM } = geodeticOf({ x, y, z });
      expect(Math.abs(latitude)).toBeLessThanOrEqual(90);
      expect(Math.abs(longitude)).toBeLessThanOrEqual(180);
      expect(heightM).not.toBeNaN();
    }),
    {
      examples: [
        [0, 0, 0],
        [1000, 0, 0],
        [0, 0, -1],
        [-42_000, 10, -1],
      ],
    },
  );
  expect(geodeticOf({ x: 0, y: 0, z: 0 })).toEqual({ latitude: 0, longitude: 0, heightM: -6_378_137 });
});
