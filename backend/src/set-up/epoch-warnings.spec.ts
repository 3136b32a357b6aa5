import { describe, expect, it } from 'vitest';
import { epochWarnings } from './epoch-warnings.js';

const NOW = 1_000_000;
const epochs = (change: (index: number) => Record<string, number | null> = () => ({}), count = 10) =>
  Array.from({ length: count }, (_, index) => ({
    time: NOW - (count - index) * 1000,
    ageMs: 1000,
    stationId: 7,
    ...change(index),
  }));
const quiet = { eastM: 0.004, northM: 0.005, upM: 0.01 };
const warningsOf = (list: ReturnType<typeof epochs>, scatter = quiet) =>
  epochWarnings(list, scatter, { now: NOW, maxAgeMs: 10_000 });

describe('what speaks against a mean', () => {
  it('nothing, for a pole that stands and is heard', () => {
    expect(warningsOf(epochs())).toEqual([]);
    expect(warningsOf(epochs(() => ({ ageMs: null, stationId: null })))).toEqual([]);
  });
  it.each<[string, string[]]>([
    ['Few epochs', warningsOf(epochs(undefined, 4))],
    ['scatter widely', warningsOf(epochs(), { eastM: 0.03, northM: 0.01, upM: 0 })],
    [
      'a pause of 3 min',
      warningsOf(epochs((at) => ({ time: NOW - (at < 5 ? 200_000 : 10_000) + at * 1000 }))),
    ],
    ['epoch is 95 s old', warningsOf(epochs((at) => ({ time: NOW - 104_000 + at * 1000 })))],
    ['up to 14 s old', warningsOf(epochs((at) => ({ ageMs: at === 3 ? 14_000 : 900 })))],
    ['The base changed', warningsOf(epochs((at) => ({ stationId: at < 3 ? 7 : 8 })))],
  ])('%s', (words, warnings) => {
    expect(warnings).toEqual([expect.stringContaining(words)]);
  });
});
