import type { Epoch } from '../fixes/epoch.js';

/** What of an epoch tells of corrections. */
export type CorrectionEpoch = Pick<Epoch, 'time' | 'quality' | 'ageMs' | 'stationId'>;

export interface CorrectionLimits {
  maxAgeMs: number;
  /** Under this they have come again: a margin below the limit, so that an age that swings about it is one outage. */
  ageClearsMs: number;
}

/** How the corrections of one rover stand. */
export interface Corrections {
  /** When the newest correction came that it used, ms UTC; null when none ever came. */
  lastAt: number | null;
  /** Since when it has been without, once that is longer than the limit; null while they come. */
  lostAt: number | null;
}

export const noCorrectionsYet: Corrections = { lastAt: null, lostAt: null };

/**
 * Moves by one epoch that is newer than those before. A receiver that gives up on old corrections stops saying how old they are (age
 * absent, quality 1): they then go on being as old as they were.
 */
export function nextCorrections(
  before: Corrections,
  epoch: CorrectionEpoch,
  limits: CorrectionLimits,
): Corrections {
  // Without a position there is nothing to correct: that says nothing of the corrections, and they are not counted on from before.
  if (epoch.quality === 0 && epoch.ageMs === null) return { lastAt: null, lostAt: before.lostAt };
  const lastAt = epoch.ageMs === null ? before.lastAt : epoch.time - epoch.ageMs;
  if (lastAt === null) return before;
  const ageMs = epoch.time - lastAt;
  if (before.lostAt !== null) {
    const areBack = epoch.ageMs !== null && ageMs < limits.ageClearsMs;
    return { lastAt, lostAt: areBack ? null : before.lostAt };
  }
  return { lastAt, lostAt: ageMs > limits.maxAgeMs ? lastAt : null };
}
