import { describe, expect, it } from 'vitest';
import { siteVisits, type TimedPlace } from './site-visits.js';

const MINUTE = 60_000;
// A minute of latitude is 1852 m, the old definition of the nautical mile, to half a percent.
const mill = { name: 'Mill', latitude: -41.5, longitude: 147.2 };
const quarry = { name: 'Quarry', latitude: -41.5 + 1 / 60, longitude: 147.2 };
/** One place each minute of [from, to), so far north of the mill. */
const stay = (from: number, to: number, minutesNorth: number): TimedPlace[] =>
  Array.from({ length: to - from }, (_, index) => ({
    time: (from + index) * MINUTE,
    latitude: mill.latitude + minutesNorth / 60,
    longitude: mill.longitude,
  }));
const words = (places: TimedPlace[]) =>
  siteVisits(places, [mill, quarry]).map(
    ({ siteName, start, end }) => `${siteName} ${start / MINUTE}-${end / MINUTE}`,
  );

describe('sites visited', () => {
  it('are those within a kilometre, in order of time', () => {
    expect(words([...stay(0, 60, 0.1), ...stay(60, 70, 3), ...stay(80, 121, 1.1)])).toEqual([
      'Mill 0-59',
      'Quarry 80-120',
    ]);
  });
  it('of two in reach the nearer one counts', () => {
    expect(words(stay(0, 10, 0.47))).toEqual(['Mill 0-9']);
    expect(words(stay(0, 10, 0.53))).toEqual(['Quarry 0-9']);
  });
  it('lunch with the rover off is the same visit, an afternoon later is another', () => {
    expect(words([...stay(0, 60, 0), ...stay(100, 160, 0), ...stay(300, 360, 0)])).toEqual([
      'Mill 0-159',
      'Mill 300-359',
    ]);
  });
  it('driving past is none, and nowhere near is nowhere', () => {
    expect(words([...stay(0, 4, 0), ...stay(10, 90, 9)])).toEqual([]);
  });
});
