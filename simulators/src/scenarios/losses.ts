import type { Cause } from '@hubtack/contracts/lost-fixes/cause.js';
import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import type { Behaviour, RoverState } from './behaviour.js';
import { between, chance } from './random.js';

/** Ground truth: the rover is not fixed over [fromSecond, toSecond), for this cause. */
export interface Loss {
  cause: Cause;
  fromSecond: number;
  toSecond: number;
}

export interface PlannedLoss {
  loss: Loss;
  behaviour: Behaviour;
}

/** A sentence speaks for ten seconds: a rover that falls silent is not fixed from nine seconds after its last full second on. */
const HELD_SECONDS = 9;

/** Numbers in this file: common practice, no source. */
const within = (second: number, from: number, to: number) => second >= from && second < to;

/** The last seconds before the fix is back: float, as a receiver re-initialises. */
const REINITIALISES_SECONDS = 8;

/** Under trees or beside a wall: satellites fall by a third or far under what is needed, HDOP rises, corrections go on. */
function skyBlocked(from: number, to: number, random: RandomGenerator): Behaviour {
  const isDeep = chance(random) < 0.6;
  const left = isDeep ? between(random, 4, 6) : between(random, 8, 13);
  const hdop = isDeep ? 2.6 + chance(random) * 3 : 1.3 + chance(random);
  return (state, second, noise) => {
    if (!within(second, from - 3, to)) return state;
    const isBack = second >= to - REINITIALISES_SECONDS;
    return {
      ...state,
      satellites: isBack ? state.satellites - 3 : left + between(noise, -1, 1),
      hdop: isBack ? state.hdop : round(hdop + chance(noise) * 0.6),
      ageSeconds: state.ageSeconds === null ? null : state.ageSeconds + chance(noise),
      quality: second < from ? 4 : !isBack && chance(noise) < 0.08 ? 2 : 5,
    };
  };
}

/** Corrections stop `held` seconds before the fix goes; the age rises a second a second, until the receiver says no age at all. */
function withoutCorrections(from: number, to: number, held: number, random: RandomGenerator): Behaviour {
  const stops = from - held;
  const floats = between(random, 15, 45);
  const gives = between(random, 50, 160);
  const backs = to - REINITIALISES_SECONDS;
  return (state, second) => {
    if (!within(second, stops, to)) return state;
    if (second >= backs) return { ...state, quality: 5 };
    const ageSeconds = (state.ageSeconds ?? 1) + second - stops;
    const since = second - from;
    const quality = second < from ? 4 : since < floats ? 5 : 2;
    // A receiver that gives up on old corrections goes on with a plain position and says no age.
    return since < gives
      ? { ...state, quality, ageSeconds }
      : { ...state, quality: 1, ageSeconds: null, stationId: null };
  };
}

/** Good sky, good corrections, float all the same: far from the base, or reflections. */
const floats =
  (from: number, to: number): Behaviour =>
  (state, second) =>
    within(second, from, to) ? { ...state, quality: 5 } : state;

/** Antenna cable, or interference: no position, hardly a satellite. */
function noPosition(from: number, to: number): Behaviour {
  return (state, second, noise) => {
    if (!within(second, from, to)) return state;
    if (second >= to - REINITIALISES_SECONDS) return { ...state, quality: 5 };
    if (second >= to - REINITIALISES_SECONDS - 4)
      return { ...state, quality: 1, ageSeconds: null, stationId: null };
    const none: RoverState = { ...state, quality: 0, satellites: between(noise, 0, 3), hdop: 99.9 };
    return { ...none, ageSeconds: null, stationId: null };
  };
}

/** Flat, out of reach, or switched off; when it is back it begins anew with a plain position. */
function silent(from: number, to: number): Behaviour {
  return (state, second) => {
    if (!within(second, from, to)) return state;
    if (second >= to - REINITIALISES_SECONDS) return { ...state, quality: 5 };
    if (second >= to - REINITIALISES_SECONDS - 6)
      return { ...state, quality: 1, ageSeconds: null, stationId: null };
    return { ...state, quiet: true };
  };
}

/** A mistyped login: a plain position since power-up, now and then helped by satellite augmentation. */
function neverCorrected(to: number, random: RandomGenerator): Behaviour {
  const hasAugmentation = chance(random) < 0.4;
  return (state, second, noise) => {
    if (second >= to) return state;
    if (second >= to - REINITIALISES_SECONDS) return { ...state, quality: 5 };
    const quality = hasAugmentation && chance(noise) < 0.9 ? 2 : 1;
    return { ...state, quality, ageSeconds: null, stationId: null };
  };
}

const round = (value: number): number => Math.round(value * 10) / 10;

/**
 * A loss of a cause, with the rover not fixed over [from, to) seconds; it comes back fixed and stays so. For `neverCorrected` and
 * `notHeard`, `from` is the beginning of the shift. `heldSeconds`: how long a receiver keeps its fix on old corrections.
 */
export function planLoss(
  cause: Exclude<Cause, 'unclear'>,
  from: number,
  to: number,
  random: RandomGenerator,
  heldSeconds = between(random, 11, 60),
): PlannedLoss {
  const loss: Loss = { cause, fromSecond: from, toSecond: to };
  switch (cause) {
    case 'skyBlocked':
      return { loss, behaviour: skyBlocked(from, to, random) };
    case 'correctionsStopped':
    case 'mountPointDown':
      return { loss, behaviour: withoutCorrections(from, to, heldSeconds, random) };
    case 'farFromBase':
    case 'notResolving':
      return { loss, behaviour: floats(from, to) };
    case 'noPosition':
      return { loss, behaviour: noPosition(from, to) };
    case 'wentQuiet':
      return { loss, behaviour: silent(from - HELD_SECONDS, to) };
    case 'neverCorrected':
      return { loss, behaviour: neverCorrected(to, random) };
    case 'notHeard':
      return { loss, behaviour: silent(from, to) };
  }
}
