import { describe, expect, it } from 'vitest';
import { isoWeekInterval, isoWeekOf, localDayOf } from './local-day.js';

const HOUR = 3_600_000;
const iso = (time: number) => new Date(time).toISOString();

// ISO week date tables published in open documentation and library tests.
const published = [
  ['1977-01-01', '1976-W53'],
  ['1977-01-02', '1976-W53'],
  ['1978-01-01', '1977-W52'],
  ['1979-12-31', '1980-W01'],
  ['1980-12-28', '1980-W52'],
  ['1980-12-29', '1981-W01'],
  ['1981-12-31', '1981-W53'],
  ['1982-01-03', '1981-W53'],
  ['2005-01-01', '2004-W53'],
  ['2005-01-02', '2004-W53'],
  ['2005-12-31', '2005-W52'],
  ['2007-01-01', '2007-W01'],
  ['2007-12-31', '2008-W01'],
  ['2020-12-31', '2020-W53'],
  ['2021-01-03', '2020-W53'],
  ['2021-01-04', '2021-W01'],
  ['2024-12-30', '2025-W01'],
  ['2025-12-29', '2026-W01'],
  ['2026-12-31', '2026-W53'],
  ['2027-01-03', '2026-W53'],
  ['2027-01-04', '2027-W01'],
] as const;

describe('ISO 8601 weeks', () => {
  it.each(published)('%s is in %s', (date, week) => {
    expect(isoWeekOf(Date.parse(date), 'UTC')).toBe(week);
    const { start, end } = isoWeekInterval(week, 'UTC');
    expect(Date.parse(date)).toBeGreaterThanOrEqual(start);
    expect(Date.parse(date)).toBeLessThan(end);
  });
  it('2026 has a week 53, 2025 has none', () => {
    expect(() => isoWeekInterval('2025-W53', 'UTC')).toThrow(RangeError);
    expect(iso(isoWeekInterval('2026-W53', 'UTC').start)).toBe('2026-12-28T00:00:00.000Z');
    for (const wrong of ['2026-W00', '2026-W54', '2026-53', '26-W01'])
      expect(() => isoWeekInterval(wrong, 'UTC')).toThrow();
  });
  it.each([
    ['America/Denver', '2026-W10', 167],
    ['America/Denver', '2026-W44', 169],
    ['Europe/Berlin', '2026-W13', 167],
    ['Europe/Berlin', '2026-W43', 169],
    ['America/Phoenix', '2026-W10', 168],
  ] as const)('%s %s lasts %d hours', (zone, week, hours) => {
    const { start, end } = isoWeekInterval(week, zone);
    expect((end - start) / HOUR).toBe(hours);
  });
});

describe('local days (IANA tz database rules)', () => {
  it('worked example C of the design: Hobart, 2026-10-04, is 23 hours', () => {
    const day = localDayOf(Date.parse('2026-10-04T03:00:00Z'), 'Australia/Hobart');
    expect([iso(day.start), iso(day.end)]).toEqual(['2026-10-03T14:00:00.000Z', '2026-10-04T13:00:00.000Z']);
    expect(day.end - day.start).toBe(82_800_000);
  });
  it.each([
    ['America/Denver', '2026-03-08T18:00:00Z', 23, '07:00'],
    ['America/Denver', '2026-11-01T18:00:00Z', 25, '06:00'],
    ['Europe/Berlin', '2026-03-29T12:00:00Z', 23, '23:00'],
    ['Europe/Berlin', '2026-10-25T12:00:00Z', 25, '22:00'],
    ['America/Phoenix', '2026-03-08T18:00:00Z', 24, '07:00'],
  ] as const)('%s at %s lasts %d hours from %sZ', (zone, at, hours, start) => {
    const day = localDayOf(Date.parse(at), zone);
    expect((day.end - day.start) / HOUR).toBe(hours);
    expect(iso(day.start).slice(11, 16)).toBe(start);
  });
});
