import { expect, it } from 'vitest';
import { isChattering } from './chattering.js';

const minutes = (...list: number[]) => list.map((minute) => minute * 60_000);
const at = (raised: number[], now: number) => isChattering(minutes(...raised), now * 60_000);

it('the third within ten minutes chatters, the second does not', () => {
  expect(at([0, 4], 4)).toBe(false);
  expect(at([0, 4, 9], 9)).toBe(true);
  expect(at([0, 4, 10], 10)).toBe(true);
  expect(at([0, 4, 10.1], 10.1)).toBe(false);
});
it('goes on with each further one, and is over five minutes after the last', () => {
  expect(at([0, 4, 9, 13], 17.9)).toBe(true);
  expect(at([0, 4, 9, 13], 18)).toBe(false);
  expect(at([0, 4, 9, 20], 20)).toBe(false);
});
