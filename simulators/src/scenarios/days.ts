import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import { DAY_SECONDS, crewOf, isFree, plannedMarks, type CrewPlan, type Day, type Place } from './day.js';
import type { SimulatedCause } from './loss-case.js';
import { between, chance, randomOf } from './random.js';

/** Fifty crews, by mount point; the first is the one that fails on a bad day. */
const mountPoints = [
  { mountPoint: 'SIM-A', crews: 12, base: { latitude: -41.43, longitude: 147.13 } },
  { mountPoint: 'SIM-B', crews: 14, base: { latitude: -41.5, longitude: 147.19 } },
  { mountPoint: 'SIM-C', crews: 13, base: { latitude: -41.39, longitude: 147.25 } },
  { mountPoint: 'SIM-D', crews: 11, base: { latitude: -41.32, longitude: 147.05 } },
];

function siteBy(base: Place, random: RandomGenerator): Place {
  const near = () => (chance(random) - 0.5) * 0.18;
  return { latitude: base.latitude + near(), longitude: base.longitude + near() };
}

function plans(random: RandomGenerator): CrewPlan[] {
  return mountPoints.flatMap(({ mountPoint, crews, base }) =>
    Array.from({ length: crews }, (_, index) => ({
      name: `${mountPoint} ${String(index + 1).padStart(2, '0')}`,
      mountPoint,
      base,
      site: siteBy(base, random),
      marks: plannedMarks(random),
      wanted: [],
    })),
  );
}

/** Puts a loss of a length from `least` to `most` seconds somewhere free into a crew's day; gives up when the day is full. */
function place(
  plan: CrewPlan,
  cause: SimulatedCause,
  least: number,
  most: number,
  random: RandomGenerator,
): void {
  for (let tries = 0; tries < 40; tries++) {
    const length = between(random, least, most);
    const fromSecond = between(random, plan.marks.startSecond + 900, plan.marks.finishSecond - length - 900);
    if (!isFree(plan.marks, plan.wanted, fromSecond, fromSecond + length)) continue;
    plan.wanted.push({ cause, fromSecond, toSecond: fromSecond + length });
    return;
  }
}

const pick = <T>(list: readonly T[], random: RandomGenerator): T =>
  list[between(random, 0, list.length - 1)]!;

/** The base station fails under all of its crews at once; each receiver holds its fix for as long as it does. */
function failBase(all: CrewPlan[], random: RandomGenerator): Day['mountPointFailures'][number] {
  const { mountPoint } = mountPoints[0]!;
  const fromSecond = between(random, 9000, 12_000);
  const toSecond = fromSecond + between(random, 900, 1500);
  for (const plan of all.filter((one) => one.mountPoint === mountPoint)) {
    const heldSeconds = between(random, 12, 58);
    const from = fromSecond + heldSeconds;
    plan.wanted.push({
      cause: 'mountPointDown',
      fromSecond: from,
      toSecond: toSecond + between(random, 8, 20),
      heldSeconds,
    });
  }
  return { mountPoint, fromSecond, toSecond };
}

/** Two places without mobile data, each on the way of a few crews: whoever passes is not heard for some minutes. */
function deadSpots(all: readonly CrewPlan[], random: RandomGenerator): void {
  for (let spot = 0; spot < 2; spot++) {
    const onTheWay = Array.from({ length: 3 }, () => pick(all, random));
    for (const plan of onTheWay) place(plan, 'wentQuiet', 90, 360, random);
  }
}

/** One login mistyped since power-up, put right after half an hour or more. */
function mistype(plan: CrewPlan, random: RandomGenerator): void {
  const { startSecond } = plan.marks;
  plan.wanted.push({
    cause: 'neverCorrected',
    fromSecond: startSecond,
    toSecond: startSecond + between(random, 1800, 3600),
  });
}

/**
 * A bad day for fifty crews, ten hours of it: a base station fails under twelve, two mobile dead spots, tree cover, two flat batteries, a
 * mistyped mount point, lunch breaks, the end of shift, and what happens on any day. Common practice, no source.
 */
export function badDay(seed: number): Day {
  const random = randomOf(seed);
  const all = plans(random);
  const failure = failBase(all, random);
  mistype(all[mountPoints[0]!.crews]!, random);
  deadSpots(all, random);
  const underTrees = Array.from({ length: 5 }, () => pick(all, random));
  for (const plan of underTrees)
    for (let visits = 0; visits < 3; visits++) place(plan, 'skyBlocked', 60, 900, random);
  for (let flat = 0; flat < 2; flat++) place(pick(all, random), 'wentQuiet', 600, 1800, random);
  for (let count = 0; count < 9; count++) place(pick(all, random), 'correctionsStopped', 60, 600, random);
  for (let count = 0; count < 4; count++) place(pick(all, random), 'notResolving', 60, 400, random);
  place(pick(all, random), 'noPosition', 120, 600, random);
  const crews = all.map((plan) => crewOf(plan, random));
  return { seconds: DAY_SECONDS, crews, mountPointFailures: [failure] };
}

/** A good day: fifty crews, a handful of short losses. */
export function goodDay(seed: number): Day {
  const random = randomOf(seed);
  const all = plans(random);
  for (let count = 0; count < 4; count++) place(pick(all, random), 'skyBlocked', 45, 180, random);
  place(pick(all, random), 'correctionsStopped', 45, 120, random);
  return { seconds: DAY_SECONDS, crews: all.map((plan) => crewOf(plan, random)), mountPointFailures: [] };
}

export const days = { 'bad-day': badDay, 'good-day': goodDay } as const;
