import type { ControlPoint } from '@hubtack/contracts/control-points/control-point.js';
import { expect, it } from 'vitest';
import { nearestPoints } from './nearest-points';

const point = (name: string, latitude: number, active = true): ControlPoint => ({
  id: latitude,
  name,
  latitude,
  longitude: 147,
  height: null,
  heightKind: 'geoid',
  datum: null,
  note: null,
  active,
});
const points = [point('A', -41), point('B', -42), point('C', -41.5), point('Gone', -41.9, false)];

it('the nearest comes first, and what is put away not at all', () => {
  const found = nearestPoints(points, { latitude: -41.9, longitude: 147 });
  expect(found.map(({ name }) => name)).toEqual(['B', 'C', 'A']);
  // A tenth of a degree of latitude is 11.1 km.
  expect(found[0]!.distanceM! / 1000).toBeCloseTo(11.1, 1);
});
it('by name when nobody knows where the rover is', () => {
  for (const place of [undefined, { latitude: null, longitude: null }])
    expect(nearestPoints(points, place).map(({ name, distanceM }) => [name, distanceM])).toEqual([
      ['A', null],
      ['B', null],
      ['C', null],
    ]);
});
