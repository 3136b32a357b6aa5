import { causes, type Cause } from '@hubtack/contracts/lost-fixes/cause.js';
import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import { steady, type Behaviour } from './behaviour.js';
import { flickers, missingSentences } from './flickers.js';
import { planLoss, type Loss } from './losses.js';
import { between, chance, randomOf } from './random.js';

export type SimulatedCause = Exclude<Cause, 'unclear'>;
export const simulatedCauses = causes.filter((cause): cause is SimulatedCause => cause !== 'unclear');

interface Place {
  latitude: number;
  longitude: number;
}

export interface CaseRover {
  site: Place;
  behaviours: Behaviour[];
  /** What is true of it; null for one that is well. */
  loss: Loss | null;
}

/** Rovers on one mount point, one of which (or for a failed mount point, most) loses its fix for a known cause. */
export interface LossCase {
  cause: SimulatedCause;
  seconds: number;
  base: Place;
  rovers: CaseRover[];
}

export const CASE_SECONDS = 960;
const METRES_A_DEGREE = 111_320;

function placeNear(base: Place, random: RandomGenerator, leastKm: number, mostKm: number): Place {
  const metres = (leastKm + chance(random) * (mostKm - leastKm)) * 1000;
  const bearing = chance(random) * 2 * Math.PI;
  const shrink = Math.cos((base.latitude * Math.PI) / 180);
  return {
    latitude: base.latitude + (Math.cos(bearing) * metres) / METRES_A_DEGREE,
    longitude: base.longitude + (Math.sin(bearing) * metres) / (METRES_A_DEGREE * shrink),
  };
}

/** The same seed gives the same case. The shift begins at second 0; losses in its course begin after five to eight minutes. */
export function lossCase(cause: SimulatedCause, seed: number): LossCase {
  const random = randomOf(seed * 31 + simulatedCauses.indexOf(cause));
  const base = { latitude: -41.44 + chance(random) * 0.1, longitude: 147.14 + chance(random) * 0.1 };
  const isFromStart = cause === 'neverCorrected' || cause === 'notHeard';
  const from = isFromStart ? 0 : between(random, 300, 480);
  const to = isFromStart ? CASE_SECONDS - 60 : from + between(random, 60, 240);
  const count = cause === 'mountPointDown' ? between(random, 3, 5) : between(random, 3, 4);
  const failing = cause === 'mountPointDown' ? between(random, Math.ceil(count / 2), count) : 1;
  const stops = from - 60;
  const rovers = Array.from({ length: count }, (_, index): CaseRover => {
    const isFailing = index < Math.max(failing, cause === 'mountPointDown' ? 2 : 1);
    const isFar = isFailing && cause === 'farFromBase';
    const site = isFar ? placeNear(base, random, 20.5, 45) : placeNear(base, random, 1, 18);
    if (!isFailing) return rover(site, null, random);
    // All lose their corrections at the same moment, give or take a second; each receiver holds its fix for as long as it does.
    const held = between(random, 12, 58);
    const own = cause === 'mountPointDown' ? stops + held + between(random, 0, 1) : from;
    return rover(site, planLoss(cause, own, Math.max(to, own + 60), random, held), random);
  });
  return { cause, seconds: CASE_SECONDS, base, rovers };
}

function rover(site: Place, planned: ReturnType<typeof planLoss> | null, random: RandomGenerator): CaseRover {
  const losses = planned ? [planned.loss] : [];
  const behaviours = [
    steady(between(random, 12, 40)),
    ...(planned ? [planned.behaviour] : []),
    flickers(CASE_SECONDS, 150, losses, random),
    missingSentences(CASE_SECONDS, losses, random),
  ];
  return { site, behaviours, loss: planned?.loss ?? null };
}
