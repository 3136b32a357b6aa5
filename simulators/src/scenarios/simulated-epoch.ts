import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import type { Behaviour, RoverState } from './behaviour.js';
import { chance } from './random.js';

/** What a rover's sentences say at one instant; absent is null. */
export interface SimulatedEpoch {
  time: number;
  quality: number;
  satellites: number | null;
  hdop: number | null;
  ageMs: number | null;
  stationId: number | null;
  latitude: number | null;
  longitude: number | null;
}

const SCATTER_DEGREES = 0.0006;

const nothing: RoverState = {
  quality: 0,
  satellites: 0,
  hdop: 99.9,
  ageSeconds: null,
  stationId: null,
  quiet: false,
};

export const stateAt = (
  behaviours: readonly Behaviour[],
  second: number,
  random: RandomGenerator,
): RoverState => behaviours.reduce((state, behave) => behave(state, second, random), nothing);

/** The epoch of one second without going through sentences; null when the rover says nothing. */
export function epochAt(
  behaviours: readonly Behaviour[],
  site: { latitude: number; longitude: number },
  startAt: number,
  second: number,
  random: RandomGenerator,
): SimulatedEpoch | null {
  const state = stateAt(behaviours, second, random);
  if (state.quiet) return null;
  const hasPlace = state.quality !== 0;
  const place = (degrees: number) => (hasPlace ? degrees + (chance(random) - 0.5) * SCATTER_DEGREES : null);
  return {
    time: startAt + second * 1000,
    quality: state.quality,
    satellites: state.satellites,
    hdop: state.hdop,
    ageMs: state.ageSeconds === null ? null : Math.round(state.ageSeconds * 10) * 100,
    stationId: state.stationId,
    latitude: place(site.latitude),
    longitude: place(site.longitude),
  };
}
