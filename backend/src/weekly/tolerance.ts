import type { ToleranceProfile } from '@hubtack/contracts/weekly/tolerance-profile.js';
import type { Interval } from '../common/interval.js';
import type { Epoch } from '../fixes/epoch.js';
import { clipSpans, spansOf } from '../fixes/timeline.js';

export type ToleranceEpoch = Pick<Epoch, 'time' | 'quality' | 'ageMs' | 'hdop' | 'satellites'>;

/** Fixed, and age, HDOP and satellites within the profile. What the receiver left out is not within it. */
export const isWithin = (
  { quality, ageMs, hdop, satellites }: ToleranceEpoch,
  profile: ToleranceProfile,
): boolean =>
  quality === 4 &&
  ageMs !== null &&
  ageMs <= profile.maxAgeSeconds * 1000 &&
  hdop !== null &&
  hdop <= profile.maxHdop &&
  satellites !== null &&
  satellites >= profile.minSatellites;

/**
 * Runs within the profile over the window, from epochs sorted by time that begin a hold time before it. An epoch speaks as it does on the
 * timeline: until the next, for the hold time at most.
 */
export function withinSpans(
  epochs: readonly ToleranceEpoch[],
  profile: ToleranceProfile,
  window: Interval,
): Interval[] {
  const judged = epochs.map((epoch) => ({ time: epoch.time, quality: isWithin(epoch, profile) ? 4 : 0 }));
  return clipSpans(spansOf(judged), window.start, window.end)
    .filter(({ state }) => state === 'fixed')
    .map(({ start, end }) => ({ start, end }));
}
