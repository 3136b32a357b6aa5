import { describe, expect, it } from 'vitest';
import type { Day, DayCrew } from './day.js';
import { badDay, goodDay } from './days.js';
import { randomOf } from './random.js';
import { stateAt } from './simulated-epoch.js';

/** Stretches of working time, seconds, in which the newest sentence of the last ten seconds does not say fixed. */
function lostStretches(crew: DayCrew, seconds: number): { fromSecond: number; toSecond: number }[] {
  const random = randomOf(5);
  const { startSecond, finishSecond, pauses } = crew.marks;
  const works = (second: number) =>
    second >= startSecond &&
    second < finishSecond &&
    pauses.every(({ fromSecond, toSecond }) => second < fromSecond || second >= toSecond);
  const stretches: { fromSecond: number; toSecond: number }[] = [];
  let heardAt = -100;
  let quality = 0;
  for (let second = 0; second < seconds; second++) {
    const state = stateAt(crew.behaviours, second, random);
    if (!state.quiet) {
      heardAt = second;
      quality = state.quality;
    }
    if (!works(second) || (second - heardAt < 10 && quality === 4)) continue;
    const last = stretches.at(-1);
    if (last?.toSecond === second) last.toSecond++;
    else stretches.push({ fromSecond: second, toSecond: second + 1 });
  }
  return stretches;
}

const separate = (day: Day) =>
  day.crews.flatMap(({ losses }) => losses.filter(({ cause }) => cause !== 'mountPointDown'));

describe.each([1, 2, 3, 4, 5])('a bad day, seed %i', (seed) => {
  const day = badDay(seed);
  it('is as its truth says, to the second: every loss of half a minute, and no other', () => {
    for (const crew of day.crews) {
      const long = lostStretches(crew, day.seconds).filter(
        ({ fromSecond, toSecond }) => toSecond - fromSecond >= 15,
      );
      const truth = crew.losses.map(({ fromSecond, toSecond }) => ({ fromSecond, toSecond }));
      expect(long, crew.name).toEqual(truth.toSorted((a, b) => a.fromSecond - b.fromSecond));
    }
  });
  it('has a base station failing under twelve crews, and about forty losses beside it', () => {
    expect(day.crews).toHaveLength(50);
    expect(day.mountPointFailures).toHaveLength(1);
    const under = day.crews.filter(({ losses }) => losses.some(({ cause }) => cause === 'mountPointDown'));
    expect(under).toHaveLength(12);
    expect(separate(day).length).toBeGreaterThan(25);
    expect(separate(day).length).toBeLessThan(50);
  });
});

/** When each notice would be due: one for each separate loss, one for the base station. */
function dueSeconds(day: Day): number[] {
  const ofLosses = separate(day).map(
    ({ cause, fromSecond }) => fromSecond + (cause === 'neverCorrected' ? 300 : 30),
  );
  return [...ofLosses, ...day.mountPointFailures.map(({ fromSecond }) => fromSecond + 60)];
}

it.each([1, 2, 3, 4, 5])(
  'a bad day, seed %i, is due sixty notices at most, and never more than ten in ten minutes',
  (seed) => {
    const due = dueSeconds(badDay(seed));
    expect(due.length).toBeLessThanOrEqual(60);
    for (const from of due)
      expect(due.filter((at) => at >= from && at < from + 600).length).toBeLessThanOrEqual(10);
  },
);

it('the same seed is the same day, another is another', () => {
  const told = (seed: number) => {
    const day = badDay(seed);
    const random = randomOf(seed);
    const states = day.crews.map(({ behaviours }) =>
      Array.from({ length: 400 }, (_, index) => stateAt(behaviours, index * 90, random)),
    );
    return JSON.stringify([day, states]);
  };
  expect(told(3)).toBe(told(3));
  expect(told(3)).not.toBe(told(4));
});

it.each([1, 2, 3, 4, 5])('a good day, seed %i, is as its truth says, to the second', (seed) => {
  const day = goodDay(seed);
  for (const crew of day.crews) {
    const long = lostStretches(crew, day.seconds).filter(
      ({ fromSecond, toSecond }) => toSecond - fromSecond >= 15,
    );
    const truth = crew.losses.map(({ fromSecond, toSecond }) => ({ fromSecond, toSecond }));
    expect(long, crew.name).toEqual(truth.toSorted((a, b) => a.fromSecond - b.fromSecond));
  }
});

it('a good day has a handful of short losses', () => {
  const losses = separate(goodDay(1));
  expect(losses.length).toBeLessThanOrEqual(5);
  expect(Math.max(...losses.map(({ fromSecond, toSecond }) => toSecond - fromSecond))).toBeLessThanOrEqual(
    180,
  );
});
