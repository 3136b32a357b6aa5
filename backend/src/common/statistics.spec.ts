import { describe, expect, it } from 'vitest';
import { mean, percentile } from './statistics.js';

// NIST/SEMATECH e-Handbook, "Percentiles" (prc252): twelve resistivities.
const resistivities = [
  95.1772, 95.1567, 95.1937, 95.1959, 95.1442, 95.061, 95.1591, 95.1195, 95.1065, 95.0925, 95.199, 95.1682,
];

describe('percentile, type 7', () => {
  it('of the NIST example: 95.19568 at 90 %, 95.1579 at 50 %', () => {
    expect(percentile(resistivities, 0.9)).toBeCloseTo(95.19568, 10);
    expect(percentile(resistivities, 0.5)).toBeCloseTo(95.1579, 10);
  });
  it.each([
    [0.05, 16],
    [0.3, 23],
    [0.4, 29],
    [0.5, 35],
    [1, 50],
  ])('of 15 20 35 40 50 at %d is %d', (p, expected) => {
    expect(percentile([15, 20, 35, 40, 50], p)).toBeCloseTo(expected, 12);
  });
  it('of nothing is nothing', () => {
    expect(percentile([], 0.9)).toBeNull();
  });
});

describe('mean', () => {
  // NIST StRD, univariate: certified means.
  const alternating = (middle: number) => [
    middle,
    ...Array.from({ length: 1000 }, (_, index) => middle + (index % 2 === 0 ? -0.1 : 0.1)),
  ];
  it.each([
    ['NumAcc1', [10_000_001, 10_000_003, 10_000_002], 10_000_002],
    ['NumAcc2', alternating(1.2), 1.2],
    ['NumAcc3', alternating(1_000_000.2), 1_000_000.2],
    ['NumAcc4', alternating(10_000_000.2), 10_000_000.2],
  ])('%s', (_name, values, certified) => {
    expect(mean(values)).toBeCloseTo(certified, 8);
  });
  it('of the NIST resistivities is 95.1477917; of nothing, nothing', () => {
    expect(mean(resistivities)).toBeCloseTo(95.1477917, 7);
    expect(mean([])).toBeNull();
  });
});
