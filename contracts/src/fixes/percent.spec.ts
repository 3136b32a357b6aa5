import { describe, expect, it } from 'vitest';
import { percent } from './percent.js';

describe('percent', () => {
  it.each([
    [9996, 10_000, '99.9 %'],
    [10_000, 10_000, '100.0 %'],
    [4, 10_000, '0.1 %'],
    [0, 10_000, '0.0 %'],
    [13, 40, '32.5 %'],
    // Two shifts of the design's example D: sums of times, then divided.
    [5.9, 8, '73.8 %'],
    [0, 0, 'no data'],
  ])('%d of %d is %s', (part, whole, words) => {
    expect(percent(part, whole)).toBe(words);
  });
});
