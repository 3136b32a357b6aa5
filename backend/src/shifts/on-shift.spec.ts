import type { ShiftPatternDay } from '@hubtack/contracts/crews/crew.js';
import { describe, expect, it } from 'vitest';
import { intersect, totalMs } from '../common/interval.js';
import { localDayOf } from '../common/local-day.js';
import { spansOf } from '../fixes/timeline.js';
import { crewDayOf } from './on-shift.js';

const S = 1000;
const ZONE = 'Australia/Hobart';
const at = (text: string) => Date.parse(`${text}+11:00`);
const day = localDayOf(at('2026-12-02T12:00:00'), ZONE);
const pattern: ShiftPatternDay[] = [{ weekday: 3, start: '07:00', end: '15:30' }];
const hours = (list: { start: number; end: number }[]) =>
  list.map(({ start, end }) => [(start - day.start) / 3_600_000, (end - day.start) / 3_600_000]);

describe('on-shift time of a local day', () => {
  it('worked example B of the design: a pause is taken off', () => {
    const window = { start: 0, end: 40 * S };
    const { onShift } = crewDayOf(
      window,
      [{ start: 0, end: 40 * S, pauses: [{ start: 10 * S, end: 22 * S }] }],
      [],
      'UTC',
    );
    const epochs = [
      [0, 4],
      [1, 4],
      [2, 5],
      [3, 5],
      [20, 4],
      [21, 4],
    ].map(([time, quality]) => ({ time: time! * S, quality: quality! }));
    const spans = spansOf(epochs);
    const time = (state: string) =>
      totalMs(
        intersect(
          spans.filter((span) => span.state === state),
          onShift,
        ),
      ) / S;
    expect([totalMs(onShift) / S, time('fixed'), time('float')]).toEqual([28, 11, 8]);
  });
  it('marks count before the pattern; the pattern where there are none', () => {
    const marks = [{ start: at('2026-12-02T08:00:00'), end: at('2026-12-02T10:00:00'), pauses: [] }];
    expect(crewDayOf(day, marks, pattern, ZONE)).toMatchObject({ basis: 'marks' });
    expect(hours(crewDayOf(day, marks, pattern, ZONE).onShift)).toEqual([[8, 10]]);
    expect(hours(crewDayOf(day, [], pattern, ZONE).onShift)).toEqual([[7, 15.5]]);
    expect(crewDayOf(day, [], [], ZONE).basis).toBe('noShiftSet');
  });
  it('on a holiday the pattern does not count; marks do', () => {
    const holidays = new Set(['2026-12-02']);
    expect(crewDayOf(day, [], pattern, ZONE, holidays).basis).toBe('noShiftSet');
    const marks = [{ start: at('2026-12-02T08:00:00'), end: at('2026-12-02T10:00:00'), pauses: [] }];
    expect(hours(crewDayOf(day, marks, pattern, ZONE, holidays).onShift)).toEqual([[8, 10]]);
  });
  it('an open shift and an open pause run on', () => {
    const marks = [
      {
        start: at('2026-12-02T20:00:00'),
        end: null,
        pauses: [{ start: at('2026-12-02T22:00:00'), end: null }],
      },
    ];
    expect(hours(crewDayOf(day, marks, [], ZONE).onShift)).toEqual([[20, 22]]);
    expect(hours(crewDayOf(day, marks, [], ZONE).pauses)).toEqual([[22, 24]]);
  });
  it('a shift over midnight counts on both days', () => {
    const night: ShiftPatternDay[] = [
      { weekday: 2, start: '22:00', end: '06:00' },
      { weekday: 3, start: '22:00', end: '06:00' },
    ];
    expect(hours(crewDayOf(day, [], night, ZONE).onShift)).toEqual([
      [0, 6],
      [22, 24],
    ]);
  });
  it('a shift over the change of clocks lasts an hour less in October', () => {
    const changeDay = localDayOf(Date.parse('2026-10-04T03:00:00Z'), ZONE);
    const { onShift } = crewDayOf(changeDay, [], [{ weekday: 7, start: '00:00', end: '08:00' }], ZONE);
    expect(totalMs(onShift)).toBe(7 * 3_600_000);
  });
});
