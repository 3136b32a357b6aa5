import type { CheckedBase } from '@hubtack/contracts/corrections/check.js';
import { describe, expect, it } from 'vitest';
import { baseAlarms, degrees, expectedWords } from './base-words';

const base = (change: Partial<CheckedBase> = {}): CheckedBase => ({
  stationId: 2003,
  latitude: 0,
  longitude: 0,
  heightM: 0,
  antennaHeightM: null,
  isVirtual: false,
  distanceM: null,
  horizontalMm: null,
  verticalMm: null,
  movedM: 0,
  stationBefore: null,
  ...change,
});

describe('a base that is not where it was', () => {
  it('says nothing of one that stands still', () => {
    expect(baseAlarms(base(), 'metric')).toEqual([]);
    expect(baseAlarms(base({ movedM: 0.019 }), 'metric')).toEqual([]);
  });
  it('says how far it moved, in the units of the firm', () => {
    expect(baseAlarms(base({ movedM: 1.2345 }), 'metric')).toEqual([expect.stringContaining('1.234 m')]);
    expect(baseAlarms(base({ movedM: 0.3048 }), 'feet')).toEqual([expect.stringContaining('1.000 ft')]);
  });
  it('says that it is another one', () => {
    expect(baseAlarms(base({ stationBefore: 7 }), 'metric')).toEqual([expect.stringMatching(/2003.*7/)]);
  });
  it('a virtual base moves with the rover', () => {
    expect(baseAlarms(base({ movedM: 800, isVirtual: true }), 'metric')).toEqual([]);
  });
});

it('positions and precisions as people read them', () => {
  expect(degrees(-41.44, 147.14)).toBe('41.44000000° S, 147.14000000° E');
  const near = base({ distanceM: 8400, horizontalMm: 16.4, verticalMm: 30.48 });
  expect(expectedWords(near, 'metric')).toBe('16 mm horizontal, 30 mm vertical');
  expect(expectedWords(near, 'feet')).toBe('0.05 ft horizontal, 0.10 ft vertical');
  expect(expectedWords({ ...near, distanceM: 30_001 }, 'metric')).toMatch(/too far/);
  expect(expectedWords({ ...near, distanceM: null }, 'metric')).toBeNull();
});
