import { DateTime } from 'luxon';
import { describe, expect, it } from 'vitest';
import { dailyDue, weeklyDue } from './sheet-times.js';

const MINUTE = 60_000;
const local = (text: string, zone = 'Australia/Hobart'): number =>
  DateTime.fromISO(text, { zone }).toMillis();

describe('the weekly sheet', () => {
  it.each([
    ['Sunday night', '2026-10-04T23:59:59', null],
    ['Monday before the hour', '2026-10-05T06:59:59.999', null],
    ['Monday at the hour', '2026-10-05T07:00', '2026-W40'],
    ['Tuesday, after a server that was down', '2026-10-06T15:00', '2026-W40'],
    ['the end of Wednesday', '2026-10-07T23:59:59', '2026-W40'],
    ['Thursday', '2026-10-08T00:00', null],
    ['the Monday after a week 53', '2027-01-04T07:00', '2026-W53'],
    ['the Monday after week 1', '2027-01-11T07:00', '2027-W01'],
  ])('%s', (_name, time, week) => {
    expect(weeklyDue(local(time), 7, 'Australia/Hobart')).toBe(week);
  });

  it('goes by the firm’s zone and the hour as clocks show it there, before and after they change', () => {
    // Hobart is at +10 until Sunday 2026-10-04, 02:00, and at +11 from then on.
    for (const utc of ['2026-09-27T21:00:00.000Z', '2026-10-04T20:00:00.000Z']) {
      expect(weeklyDue(Date.parse(utc) - 1, 7, 'Australia/Hobart')).toBeNull();
      expect(weeklyDue(Date.parse(utc), 7, 'Australia/Hobart')).not.toBeNull();
    }
    const inDenver = local('2026-11-02T07:00', 'America/Denver');
    expect(weeklyDue(inDenver, 7, 'America/Denver')).toBe('2026-W44');
    expect(weeklyDue(inDenver - 1, 7, 'America/Denver')).toBeNull();
    expect(weeklyDue(inDenver, 7, 'America/Phoenix')).toBe('2026-W44');
    expect(weeklyDue(inDenver, 8, 'America/Phoenix')).toBeNull();
  });

  it('a week that lost a whole day still has its Monday after it', () => {
    // Samoa had no Friday, 30 December 2011.
    const monday = local('2012-01-02T07:00', 'Pacific/Apia');
    expect(weeklyDue(monday, 7, 'Pacific/Apia')).toBe('2011-W52');
    expect(weeklyDue(monday - 1, 7, 'Pacific/Apia')).toBeNull();
  });

  it('midnight is an hour like any other', () => {
    expect(weeklyDue(local('2026-10-05T00:00'), 0, 'Australia/Hobart')).toBe('2026-W40');
  });
});

describe('the daily sheet', () => {
  const shift = (start: string, end: string) => ({ start: local(start), end: local(end) });
  const daysAt = (time: number, ...parts: { start: number; end: number }[]) =>
    dailyDue(parts, time, 'Australia/Hobart').map(({ day }) => day);
  const morning = shift('2026-10-05T07:00', '2026-10-05T11:00');
  const afternoon = shift('2026-10-05T11:30', '2026-10-05T15:30');

  it('is due a quarter of an hour after the last shift of the day, for half a day', () => {
    const end = afternoon.end;
    expect(daysAt(end + 15 * MINUTE - 1, morning, afternoon)).toEqual([]);
    expect(daysAt(end + 15 * MINUTE, morning, afternoon)).toEqual(['2026-10-05']);
    expect(daysAt(end + 12 * 60 * MINUTE - 1, morning, afternoon)).toEqual(['2026-10-05']);
    expect(daysAt(end + 12 * 60 * MINUTE, morning, afternoon)).toEqual([]);
  });

  it('not while a shift of the day is running, or is still planned', () => {
    expect(daysAt(morning.end + 20 * MINUTE, morning, afternoon)).toEqual([]);
    expect(daysAt(afternoon.start + MINUTE, morning, afternoon)).toEqual([]);
  });

  it('a night shift counts whole, on the day that it began, also over a clock change', () => {
    // Cut at midnight, as days are read. The clocks go forward in this night: 8 h on them are 7 h.
    const before = shift('2026-10-03T20:00', '2026-10-04T00:00');
    const after = shift('2026-10-04T00:00', '2026-10-04T04:00');
    const [due] = dailyDue([before, after], after.end + 15 * MINUTE, 'Australia/Hobart');
    expect(due).toEqual({ day: '2026-10-03', shifts: [{ start: before.start, end: after.end }] });
    expect(after.end - before.start).toBe(7 * 60 * MINUTE);
    expect(daysAt(local('2026-10-04T00:30'), before, after)).toEqual([]);
  });

  it('pauses keep a shift together', () => {
    const parts = [
      shift('2026-10-05T07:00', '2026-10-05T12:00'),
      shift('2026-10-05T12:30', '2026-10-05T15:30'),
    ];
    const lunch = shift('2026-10-05T12:00', '2026-10-05T12:30');
    const [due] = dailyDue([...parts, lunch], parts[1]!.end + 15 * MINUTE, 'Australia/Hobart');
    expect(due!.shifts).toHaveLength(1);
  });

  it('no shift, no sheet', () => {
    expect(daysAt(local('2026-10-05T18:00'))).toEqual([]);
  });
});
