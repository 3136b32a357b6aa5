import { mean, standardDeviation } from '@hubtack/backend/common/statistics.js';
import { describe, expect, it } from 'vitest';

/**
 * NIST Statistical Reference Datasets, univariate summary statistics (itl.nist.gov/div898/strd/univ). NumAcc1 and NumAcc4: certified
 * values as reproduced in Stata's certification files; NumAcc2 and NumAcc3: certificate from memory, mean and deviation recomputed
 * in exact decimal arithmetic.
 */
const alternating = (first: number, low: number, high: number): number[] => [
  first,
  ...Array.from({ length: 500 }, () => [low, high]).flat(),
];

describe('means and deviations of large numbers with small differences keep their digits', () => {
  it.each([
    ['NumAcc1', [10_000_001, 10_000_003, 10_000_002], 10_000_002, 1, 12],
    ['NumAcc2', alternating(1.2, 1.1, 1.3), 1.2, 0.1, 12],
    ['NumAcc3', alternating(1_000_000.2, 1_000_000.1, 1_000_000.3), 1_000_000.2, 0.1, 8],
    ['NumAcc4', alternating(10_000_000.2, 10_000_000.1, 10_000_000.3), 10_000_000.2, 0.1, 8],
  ])('%s', (_name, values, certifiedMean, certifiedDeviation, digits) => {
    expect(mean(values)).toBeCloseTo(certifiedMean, 8);
    expect(standardDeviation(values)).toBeCloseTo(certifiedDeviation, digits);
  });
  it('no deviation of one value, no mean of none', () => {
    expect(standardDeviation([7])).toBeNull();
    expect(mean([])).toBeNull();
  });
});
