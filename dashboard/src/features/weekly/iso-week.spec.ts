import { describe, expect, it } from 'vitest';
import { isoWeekOf, mondayOf, weekAfter, weekDates } from './iso-week';

// ISO week dates of the published tables (reference: time-and-statistics, section 1).
describe('ISO weeks', () => {
  it.each([
    ['1977-01-01', '1976-W53'],
    ['1979-12-31', '1980-W01'],
    ['1981-12-31', '1981-W53'],
    ['2005-01-02', '2004-W53'],
    ['2020-12-31', '2020-W53'],
    ['2021-01-04', '2021-W01'],
    ['2024-12-30', '2025-W01'],
    ['2026-12-31', '2026-W53'],
    ['2027-01-03', '2026-W53'],
    ['2027-01-04', '2027-W01'],
  ])('%s is in %s', (date, week) => {
    expect(isoWeekOf(new Date(`${date}T00:00:00Z`))).toBe(week);
  });
  it('go on over the end of a year of 53 weeks', () => {
    expect(weekAfter('2026-W53', 1)).toBe('2027-W01');
    expect(weekAfter('2027-W01', -1)).toBe('2026-W53');
    expect(mondayOf('2026-W53').toISOString().slice(0, 10)).toBe('2026-12-28');
    expect(weekDates('2026-W53')).toBe('28 Dec 2026 – 3 Jan 2027');
    expect(weekDates('2026-W40')).toBe('28 Sept – 4 Oct 2026');
  });
});
