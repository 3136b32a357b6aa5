import { expect, it } from 'vitest';
import { ribbonWindow } from './ribbon-window';

const HOUR = 3_600_000;
const day = {
  dayStart: 1_000 * HOUR,
  dayEnd: 1_024 * HOUR,
  onShift: [{ start: 1_007.1 * HOUR, end: 1_024 * HOUR }],
  rovers: [],
};

it('runs from the hour in which the shift began to now', () => {
  expect(ribbonWindow(day, 1_012 * HOUR)).toEqual({ from: 1_007 * HOUR, to: 1_012 * HOUR });
});
it('or from the first sentence, when that came before', () => {
  const spans = [{ state: 'fixed' as const, start: 1_006.9 * HOUR, end: 1_007 * HOUR }];
  const rovers = [{ id: 1, label: 'R-01', spans }];
  expect(ribbonWindow({ ...day, rovers }, 1_012 * HOUR).from).toBe(1_006 * HOUR);
});
it('a shift that is still to come does not count, and a new day starts no earlier than midnight', () => {
  expect(ribbonWindow(day, 1_006 * HOUR)).toEqual({ from: 1_004 * HOUR, to: 1_006 * HOUR });
  expect(ribbonWindow(day, 1_000 * HOUR + 60_000)).toEqual({
    from: 1_000 * HOUR,
    to: 1_000 * HOUR + 60_000,
  });
});
