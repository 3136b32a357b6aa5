import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import type { Behaviour } from './behaviour.js';
import type { Loss } from './losses.js';
import { between } from './random.js';

/** Away from a loss and from each other by this much, so that none joins another to something longer. */
const APART_SECONDS = 75;
const LONGEST_SECONDS = 9;

/** Losses of a second or a few, as on any day: no lost fix comes of them. Every `meanSeconds` or so over [0, seconds). */
export function flickers(
  seconds: number,
  meanSeconds: number,
  losses: readonly Loss[],
  random: RandomGenerator,
): Behaviour {
  const starts: { at: number; length: number }[] = [];
  for (let at = APART_SECONDS; at < seconds; at += between(random, APART_SECONDS, 2 * meanSeconds)) {
    const length = between(random, 1, LONGEST_SECONDS);
    const isClear = losses.every(
      ({ fromSecond, toSecond }) => at + length < fromSecond - APART_SECONDS || at > toSecond + APART_SECONDS,
    );
    if (isClear) starts.push({ at, length });
  }
  const floats = new Set(
    starts.flatMap(({ at, length }) => Array.from({ length }, (_, index) => at + index)),
  );
  return (state, second) => (floats.has(second) && state.quality === 4 ? { ...state, quality: 5 } : state);
}

/** Not where a loss begins or ends: its truth is to be exact to the second. */
const CLEAR_OF_EDGES_SECONDS = 20;

/** A sentence now and then does not come: less than the time that the one before speaks for. */
export function missingSentences(
  seconds: number,
  losses: readonly Loss[],
  random: RandomGenerator,
): Behaviour {
  const edges = losses.flatMap(({ fromSecond, toSecond }) => [fromSecond, toSecond]);
  const missing = new Set(
    Array.from({ length: Math.ceil(seconds / 200) }, () => between(random, 0, seconds)).filter((second) =>
      edges.every((edge) => Math.abs(second - edge) > CLEAR_OF_EDGES_SECONDS),
    ),
  );
  return (state, second) => (missing.has(second) ? { ...state, quiet: true } : state);
}
