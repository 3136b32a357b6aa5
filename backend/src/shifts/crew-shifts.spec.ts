import type { ShiftPatternDay } from '@hubtack/contracts/crews/crew.js';
import { describe, expect, it } from 'vitest';
import { totalMs, type Interval } from '../common/interval.js';
import { clipShift, crewShiftsOf, type CrewShift } from './crew-shifts.js';
import type { ShiftMark } from './on-shift.js';

const ZONE = 'Australia/Hobart';
const at = (text: string) => Date.parse(`${text}+11:00`);
const interval = (start: string, end: string): Interval => ({ start: at(start), end: at(end) });
const local = (time: number | null) =>
  time === null ? null : new Date(time + 11 * 3_600_000).toISOString().slice(5, 16).replace('T', ' ');
const told = (shifts: CrewShift[]) =>
  shifts.map(({ basis, start, end }) => [basis, local(start), local(end)]);

const noon = interval('2026-12-02T12:00:00', '2026-12-02T12:01:00');
const days: ShiftPatternDay[] = [2, 3, 4].map((weekday) => ({ weekday, start: '07:00', end: '15:30' }));
const nights: ShiftPatternDay[] = [2, 3].map((weekday) => ({ weekday, start: '22:00', end: '06:00' }));
const shifts = (window: Interval, marks: ShiftMark[], pattern: ShiftPatternDay[] = days) =>
  crewShiftsOf(window, marks, pattern, ZONE, () => null);

describe('shifts that overlap a window', () => {
  it('the pattern where the day has no marks', () => {
    expect(told(shifts(noon, []))).toEqual([['pattern', '12-02 07:00', '12-02 15:30']]);
  });
  it('marks count instead, each as its own shift; the pattern stays on other days', () => {
    const marks = [
      { ...interval('2026-12-02T06:30:00', '2026-12-02T11:00:00'), pauses: [] },
      { ...interval('2026-12-02T12:30:00', '2026-12-02T16:00:00'), pauses: [] },
    ];
    expect(told(shifts(interval('2026-12-02T00:00:00', '2026-12-04T00:00:00'), marks))).toEqual([
      ['marks', '12-02 06:30', '12-02 11:00'],
      ['marks', '12-02 12:30', '12-02 16:00'],
      ['pattern', '12-03 07:00', '12-03 15:30'],
    ]);
    expect(shifts(noon, marks)).toEqual([]);
  });
  it('an open shift runs on, its open pause with it', () => {
    const marks: ShiftMark[] = [
      {
        start: at('2026-12-02T07:00:00'),
        end: null,
        pauses: [{ start: at('2026-12-02T12:00:00'), end: null }],
      },
    ];
    const [open] = shifts(noon, marks);
    expect(open!.end).toBeNull();
    expect(open!.onShift).toEqual([interval('2026-12-02T07:00:00', '2026-12-02T12:00:00')]);
  });
  it('a night shift is one, seen from either side of midnight', () => {
    for (const text of ['2026-12-02T23:30:00', '2026-12-03T00:30:00']) {
      const window = { start: at(text), end: at(text) + 1000 };
      expect(told(shifts(window, [], nights))).toEqual([['pattern', '12-02 22:00', '12-03 06:00']]);
    }
  });
  it('a night shift over the change of clocks lasts seven hours, and is one', () => {
    const window = { start: Date.parse('2026-10-03T15:00:00Z'), end: Date.parse('2026-10-03T15:01:00Z') };
    const [shift] = shifts(window, [], [{ weekday: 6, start: '22:00', end: '06:00' }]);
    expect(totalMs(shift!.onShift)).toBe(7 * 3_600_000);
  });
  it('without marks and pattern: from the first to the last heard instant of the day', () => {
    const heard = interval('2026-12-02T08:00:00', '2026-12-02T14:00:00');
    const found = crewShiftsOf(noon, [], [], ZONE, (day) =>
      day.start === at('2026-12-02T00:00:00') ? heard : null,
    );
    expect(told(found)).toEqual([['noShiftSet', '12-02 08:00', '12-02 14:00']]);
  });
});

describe('the part in which the crew had the rover', () => {
  const shift: CrewShift = {
    basis: 'marks',
    ...interval('2026-12-02T07:00:00', '2026-12-02T15:30:00'),
    onShift: [
      interval('2026-12-02T07:00:00', '2026-12-02T11:30:00'),
      interval('2026-12-02T12:30:00', '2026-12-02T15:30:00'),
    ],
    pauses: [interval('2026-12-02T11:30:00', '2026-12-02T12:30:00')],
  };
  it('from noon on', () => {
    const clipped = clipShift(shift, { start: at('2026-12-02T12:00:00'), end: null })!;
    expect(told([clipped])).toEqual([['marks', '12-02 12:00', '12-02 15:30']]);
    expect(totalMs(clipped.onShift)).toBe(3 * 3_600_000);
    expect(totalMs(clipped.pauses)).toBe(30 * 60_000);
  });
  it('of an open shift until the rover went to another crew', () => {
    const open = { ...shift, end: null };
    expect(clipShift(open, { start: 0, end: at('2026-12-02T13:00:00') })!.end).toBe(
      at('2026-12-02T13:00:00'),
    );
    expect(clipShift(open, { start: 0, end: null })!.end).toBeNull();
    expect(clipShift(open, interval('2026-12-01T00:00:00', '2026-12-01T12:00:00'))).toBeNull();
  });
});
