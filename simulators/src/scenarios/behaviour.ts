import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import { chance } from './random.js';

/** What a rover would report at one instant. */
export interface RoverState {
  quality: number;
  satellites: number;
  hdop: number;
  /** Seconds since the newest correction; null when none ever came. */
  ageSeconds: number | null;
  stationId: number | null;
  /** Sends nothing at all. */
  quiet: boolean;
}

/** One fault, or ordinary life: changes what a rover reports. Behaviours are put in a row and each sees the one before. */
export type Behaviour = (state: RoverState, seconds: number, random: RandomGenerator) => RoverState;

/** Good sky, good corrections: fixed after half a minute, with the small unrest that every receiver shows. */
export const steady =
  (firstFixAfter = 25): Behaviour =>
  (_state, seconds, random) => ({
    quality: seconds < firstFixAfter ? (seconds < firstFixAfter / 2 ? 1 : 5) : 4,
    satellites: 18 + Math.floor(chance(random) * 9),
    hdop: 0.5 + Math.floor(chance(random) * 7) / 10,
    ageSeconds: seconds < 4 ? null : 0.6 + chance(random) * 1.4,
    stationId: seconds < 4 ? null : 1,
    quiet: false,
  });

const during = (seconds: number, from: number, length: number): boolean =>
  seconds >= from && seconds < from + length;

/** Under trees: satellites fall, corrections go on, the ambiguities are lost. */
export const trees =
  (from: number, length: number): Behaviour =>
  (state, seconds, random) => {
    if (!during(seconds, from, length + 20)) return state;
    const into = seconds - from;
    if (into >= length) return { ...state, quality: into < length + 12 ? 5 : 4 };
    return {
      ...state,
      satellites: Math.max(5, state.satellites - Math.min(16, into * 3) + Math.floor(chance(random) * 2)),
      hdop: 2.2 + Math.floor(chance(random) * 14) / 10,
      quality: into < 3 ? 4 : chance(random) < 0.12 ? 2 : 5,
    };
  };

/** The correction stream stops: age rises a second a second; the receiver holds its fix for half a minute, then gives up. */
export const correctionsStopped =
  (from: number, length: number): Behaviour =>
  (state, seconds) => {
    if (!during(seconds, from, length + 15)) return state;
    const into = seconds - from;
    if (into >= length) return { ...state, quality: into < length + 8 ? 5 : 4 };
    const quality = into < 30 ? 4 : into < 60 ? 5 : 2;
    return { ...state, ageSeconds: (state.ageSeconds ?? 1) + into, quality };
  };

/** Switched off, out of reach, or flat. */
export const quiet =
  (from: number, length: number): Behaviour =>
  (state, seconds) =>
    during(seconds, from, length) ? { ...state, quiet: true } : state;

/** Corrections never come (a mistyped login or mount point): a plain position, no age, no station. */
export const neverCorrected = (): Behaviour => (state) => ({
  ...state,
  quality: 1,
  ageSeconds: null,
  stationId: null,
});

/** Losses of a second now and then, as on any day. */
export const unrest =
  (meanSeconds: number): Behaviour =>
  (state, seconds, random) => {
    const isLost = chance(random) < 1 / meanSeconds;
    return isLost && state.quality === 4 && seconds > 60 ? { ...state, quality: 5 } : state;
  };
