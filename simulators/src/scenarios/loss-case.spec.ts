import { describe, expect, it } from 'vitest';
import { CASE_SECONDS, lossCase, simulatedCauses, type CaseRover } from './loss-case.js';
import { randomOf } from './random.js';
import { epochAt, type SimulatedEpoch } from './simulated-epoch.js';

function epochsOf(rover: CaseRover, seed = 7): (SimulatedEpoch | null)[] {
  const random = randomOf(seed);
  return Array.from({ length: CASE_SECONDS }, (_, second) =>
    epochAt(rover.behaviours, rover.site, 0, second, random),
  );
}

/** Where a sentence of the last ten seconds says fixed: the newest one counts. */
function fixedSeconds(epochs: readonly (SimulatedEpoch | null)[]): boolean[] {
  return epochs.map((_, second) => {
    for (let back = 0; back < 10 && second - back >= 0; back++) {
      const epoch = epochs[second - back];
      if (epoch) return epoch.quality === 4;
    }
    return false;
  });
}

describe.each(simulatedCauses)('%s', (cause) => {
  it('is as its truth says, to the second', () => {
    for (let seed = 1; seed <= 20; seed++) {
      for (const rover of lossCase(cause, seed).rovers) {
        const isFixed = fixedSeconds(epochsOf(rover));
        const { loss } = rover;
        if (!loss) continue;
        const lost = isFixed.slice(loss.fromSecond, loss.toSecond);
        expect(
          lost.every((fixed) => !fixed),
          `seed ${seed}`,
        ).toBe(true);
        if (loss.fromSecond > 0) expect(isFixed[loss.fromSecond - 1], `seed ${seed}`).toBe(true);
        const after = isFixed.slice(loss.toSecond, loss.toSecond + 20);
        expect(
          after.every((fixed) => fixed),
          `seed ${seed}`,
        ).toBe(true);
      }
    }
  });
  it('the same seed is the same case, another is another', () => {
    const told = (seed: number) =>
      JSON.stringify(lossCase(cause, seed).rovers.map((rover) => epochsOf(rover)));
    expect(told(3)).toBe(told(3));
    expect(told(3)).not.toBe(told(4));
  });
});

it('who is well loses the fix for less than fifteen seconds at a time', () => {
  for (let seed = 1; seed <= 20; seed++) {
    for (const rover of lossCase('skyBlocked', seed).rovers.filter(({ loss }) => loss === null)) {
      let lost = 0;
      for (const fixed of fixedSeconds(epochsOf(rover)).slice(60)) {
        lost = fixed ? 0 : lost + 1;
        expect(lost).toBeLessThan(15);
      }
    }
  }
});
