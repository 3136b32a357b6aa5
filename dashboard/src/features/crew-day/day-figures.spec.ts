import { wholeOf } from '@hubtack/contracts/fixes/totals.js';
import type { CrewDayView } from '@hubtack/contracts/shifts/shift.js';
import { describe, expect, it } from 'vitest';
import { dayTotals, pausesOf, windowOf, workedOf } from './day-figures';

const day: CrewDayView = {
  crewId: 1,
  crewName: 'Alder',
  dayStart: 0,
  dayEnd: 86_400_000,
  basis: 'marks',
  duty: 'onShift',
  shifts: [],
  onShift: [
    { start: 100, end: 200 },
    { start: 300, end: 1000 },
  ],
  rovers: [],
  lostFixes: [],
};
const spans = [
  { state: 'fixed' as const, start: 50, end: 150 },
  { state: 'float' as const, start: 180, end: 400 },
];

describe('a day of a crew', () => {
  it('states add up to what was worked, to now and no further', () => {
    const worked = workedOf(day, spans, 500);
    expect(worked).toEqual([
      { start: 100, end: 200 },
      { start: 300, end: 500 },
    ]);
    const totals = dayTotals(worked, spans);
    expect(totals).toEqual({ fixedMs: 50, floatMs: 120, codeMs: 0, noneMs: 0, silentMs: 130 });
    expect(wholeOf(totals)).toBe(300);
    expect(pausesOf(worked)).toEqual([{ start: 200, end: 300 }]);
  });
  it('without a shift set: from first to last heard', () => {
    expect(workedOf({ ...day, basis: 'noShiftSet', onShift: [] }, spans, 1e6)).toEqual([
      { start: 50, end: 400 },
    ]);
    expect(workedOf({ ...day, basis: 'noShiftSet', onShift: [] }, [], 1e6)).toEqual([]);
  });
  it('a day without work is shown whole', () => {
    expect(windowOf([], day)).toEqual({ start: 0, end: 86_400_000 });
  });
});
