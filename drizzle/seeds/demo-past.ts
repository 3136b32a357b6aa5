import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import { uniformInt } from 'pure-rand/distribution/uniformInt';

export interface TimedQuality {
  time: number;
  quality: number;
}

/** A few seconds between epochs: less than the hold time, so that the timeline has no gaps but those meant. */
const STEP_MS = 5000;

type Kind = 'fixed' | 'float' | 'code' | 'none' | 'silent';
const qualityOf: Record<Exclude<Kind, 'silent'>, number> = { fixed: 4, float: 5, code: 2, none: 0 };

const share = (random: RandomGenerator): number => uniformInt(random, 0, 999_999) / 1_000_000;
/** Length of an exponentially distributed run. */
const runMs = (random: RandomGenerator, meanMinutes: number): number =>
  Math.max(STEP_MS, -Math.log(1 - share(random)) * meanMinutes * 60_000);

function nextKind(random: RandomGenerator, kind: Kind): { kind: Kind; meanMinutes: number } {
  if (kind !== 'fixed') return { kind: 'fixed', meanMinutes: 0 };
  const dice = share(random);
  if (dice < 0.55) return { kind: 'float', meanMinutes: 9 };
  if (dice < 0.75) return { kind: 'code', meanMinutes: 12 };
  if (dice < 0.8) return { kind: 'none', meanMinutes: 4 };
  return { kind: 'silent', meanMinutes: 14 };
}

/**
 * Epochs of one shift: time to first fix, then fixed with losses. `trouble` is about the share of time
 * without a fix; the seeded generator decides the rest.
 */
export function epochsOfShift(
  random: RandomGenerator,
  start: number,
  end: number,
  trouble: number,
): TimedQuality[] {
  const epochs: TimedQuality[] = [];
  const fixedMinutes = 9.6 * (1 / Math.max(trouble, 0.01) - 1);
  let kind: Kind = 'float';
  let until = start + runMs(random, 1.5);
  for (let time = start; time < end; time += STEP_MS) {
    if (time >= until) {
      const next = nextKind(random, kind);
      kind = next.kind;
      until = time + runMs(random, kind === 'fixed' ? fixedMinutes : next.meanMinutes);
    }
    if (kind !== 'silent') epochs.push({ time, quality: qualityOf[kind] });
  }
  return epochs;
}
