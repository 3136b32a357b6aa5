import { expect, it } from 'vitest';
import { weekSentence } from './week-sentence.js';

const HOUR = 3_600_000;
const sum = (onShift: number, fixed: number) => ({ onShiftMs: onShift * HOUR, fixedMs: fixed * HOUR });

it.each([
  [
    sum(168, 146.83),
    sum(600, 543),
    { cause: 'correctionsStopped', mountPoint: 'TANF00', lostMs: 12.3 * HOUR },
    'Week 40: 87.4 % fix uptime, 3.1 points down on the four weeks before; 21 h 10 min of paid time without a fix, 58 % of it corrections stopped on this rover at TANF00.',
  ],
  [
    sum(10, 9),
    sum(0, 0),
    { cause: 'skyBlocked', mountPoint: 'TANF00', lostMs: 0.5 * HOUR },
    'Week 40: 90.0 % fix uptime; 1 h 0 min of paid time without a fix, 50 % of it sky blocked.',
  ],
  [
    sum(10, 9),
    sum(100, 90),
    null,
    'Week 40: 90.0 % fix uptime, as in the four weeks before; 1 h 0 min of paid time without a fix.',
  ],
  [
    sum(10, 10),
    sum(100, 90),
    null,
    'Week 40: 100.0 % fix uptime, 10.0 points up on the four weeks before; no paid time without a fix.',
  ],
  [sum(0, 0), sum(100, 90), null, 'Week 40: no shift was worked.'],
] as const)('%o', (now, before, largest, words) => {
  expect(weekSentence('2026-W40', now, before, largest)).toBe(words);
});
