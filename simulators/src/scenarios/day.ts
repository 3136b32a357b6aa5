import type { PauseReason } from '@hubtack/contracts/shifts/shift.js';
import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import { steady, type Behaviour } from './behaviour.js';
import { flickers, missingSentences } from './flickers.js';
import { planLoss, type Loss } from './losses.js';
import type { SimulatedCause } from './loss-case.js';
import { between } from './random.js';

export interface Place {
  latitude: number;
  longitude: number;
}

/** What the chief marks, in seconds since the day began. */
export interface Marks {
  startSecond: number;
  finishSecond: number;
  pauses: { fromSecond: number; toSecond: number; reason: PauseReason }[];
}

export interface DayCrew {
  name: string;
  mountPoint: string;
  base: Place;
  site: Place;
  marks: Marks;
  behaviours: Behaviour[];
  /** Ground truth: when it was not fixed on shift, and why. */
  losses: Loss[];
}

/** A working day of many crews, with what is true of it. */
export interface Day {
  seconds: number;
  crews: DayCrew[];
  mountPointFailures: { mountPoint: string; fromSecond: number; toSecond: number }[];
}

export const DAY_SECONDS = 36_000;
/** A rover is on and fixed this long before its shift, and goes on this long after it. */
const EARLY_SECONDS = 120;
const LATE_SECONDS = 40;

/** From 07:00 or so to 17:00, lunch at noon or so: seconds since the day began. Common practice, no source. */
export function plannedMarks(random: RandomGenerator): Marks {
  const startSecond = 300 + between(random, 0, 1500);
  const lunch = 16_200 + between(random, 0, 3600);
  return {
    startSecond,
    finishSecond: DAY_SECONDS - 900 - between(random, 0, 1800),
    pauses: [{ fromSecond: lunch, toSecond: lunch + 1800, reason: 'lunch' }],
  };
}

/** Switched off outside the shift and, for most, in the lunch break; on and fixed again before the break is over. */
function switched(marks: Marks, isOffAtLunch: boolean): Behaviour {
  const offs = [
    { from: 0, to: Math.max(0, marks.startSecond - EARLY_SECONDS) },
    { from: marks.finishSecond + LATE_SECONDS, to: DAY_SECONDS },
    ...(isOffAtLunch
      ? marks.pauses.map(({ fromSecond, toSecond }) => ({
          from: fromSecond + LATE_SECONDS,
          to: toSecond - EARLY_SECONDS,
        }))
      : []),
  ];
  return (state, second) => {
    for (const { from, to } of offs) {
      if (second >= from && second < to) return { ...state, quiet: true };
      if (second >= to && second < to + 25 && to > 0) return { ...state, quality: second < to + 10 ? 1 : 5 };
    }
    return state;
  };
}

/** Whether [from, to) lies in working time, away from its edges and from other losses. */
export function isFree(
  marks: Marks,
  losses: readonly Loss[],
  from: number,
  to: number,
  apart = 400,
): boolean {
  const busy = [
    { fromSecond: 0, toSecond: marks.startSecond },
    { fromSecond: marks.finishSecond, toSecond: DAY_SECONDS },
    ...marks.pauses,
    ...losses,
  ];
  return busy.every(({ fromSecond, toSecond }) => to + apart <= fromSecond || from - apart >= toSecond);
}

export interface CrewPlan {
  name: string;
  mountPoint: string;
  base: Place;
  site: Place;
  marks: Marks;
  wanted: { cause: SimulatedCause; fromSecond: number; toSecond: number; heldSeconds?: number }[];
}

/** A crew with all that happens to it, and ordinary life between. */
export function crewOf(plan: CrewPlan, random: RandomGenerator): DayCrew {
  const planned = plan.wanted.map(({ cause, fromSecond, toSecond, heldSeconds }) =>
    planLoss(cause, fromSecond, toSecond, random, heldSeconds),
  );
  const losses = planned.map(({ loss }) => loss);
  const { wanted: _wanted, ...crew } = plan;
  const behaviours = [
    steady(between(random, 12, 40)),
    ...planned.map(({ behaviour }) => behaviour),
    flickers(DAY_SECONDS, 900, losses, random),
    missingSentences(DAY_SECONDS, losses, random),
    switched(plan.marks, between(random, 0, 9) < 7),
  ];
  return { ...crew, behaviours, losses };
}
