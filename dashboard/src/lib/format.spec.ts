import { describe, expect, it } from 'vitest';
import { clockTimeSeconds, distance, duration, hours, whenWords, zoneName } from './format';

describe('times and lengths as people read them', () => {
  it.each([
    [0, '0 s'],
    [59_999, '59 s'],
    [192_000, '3 min 12 s'],
    [41 * 60_000, '41 min'],
    [6_720_000, '1 h 52 min'],
    [76 * 3_600_000, '3 d 4 h'],
  ])('%d ms is %s', (ms, words) => {
    expect(duration(ms)).toBe(words);
  });
  it('times are of the firm, with the name of its zone, summer and winter', () => {
    const summer = Date.parse('2026-12-01T22:41:07Z');
    expect(clockTimeSeconds(summer, 'Australia/Hobart')).toBe('09:41:07');
    expect(zoneName(summer, 'Australia/Hobart')).toBe('AEDT');
    expect(zoneName(Date.parse('2026-07-01T00:00:00Z'), 'Australia/Hobart')).toBe('AEST');
    expect(zoneName(summer, 'America/Denver')).toBe('MST');
  });
  it('a time of the same day has no date, by the days of the firm', () => {
    const now = Date.parse('2026-12-01T22:41:07Z');
    expect(whenWords(Date.parse('2026-12-01T13:00:00Z'), now, 'Australia/Hobart')).toBe('at 00:00');
    expect(whenWords(Date.parse('2026-12-01T12:59:00Z'), now, 'Australia/Hobart')).toBe(
      'on 1 Dec 2026, 23:59',
    );
  });
  it('distances in the firm\u2019s units', () => {
    expect([distance(640, 'metric'), distance(8400, 'metric')]).toEqual(['640 m', '8.4 km']);
    expect([distance(100, 'feet'), distance(8400, 'feet')]).toEqual(['328 ft', '5.2 mi']);
  });
});

it('working time is told in hours, never in days', () => {
  expect([hours(238.25 * 3_600_000), hours(41 * 60_000), hours(0)]).toEqual([
    '238 h 15 min',
    '41 min',
    '0 s',
  ]);
});
