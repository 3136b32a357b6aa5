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

/** The profile that counts for a crew; the firm's for none. */
export type ProfileOfCrew = (crewId: number | null) => ToleranceProfile;

interface JudgedShift {
  crewId: number;
  start: number;
  /** Null: it goes on. */
  end: number | null;
}

/**
 * The window in parts, each with the profile that counts in it: a crew's own during its shifts, the firm's between them. `shifts`: of
 * one rover; they do not overlap.
 */
export function judgedParts(
  window: Interval,
  shifts: readonly JudgedShift[],
  profileOf: ProfileOfCrew,
): (Interval & { profile: ToleranceProfile })[] {
  const firm = profileOf(null);
  const parts: (Interval & { profile: ToleranceProfile })[] = [];
  let at = window.start;
  const add = (end: number, profile: ToleranceProfile) => {
    const until = Math.min(end, window.end);
    if (until <= at) return;
    const last = parts.at(-1);
    // Parts that count alike are one, so that a run over their border stays one.
    if (last?.profile === profile) last.end = until;
    else parts.push({ start: at, end: until, profile });
    at = until;
  };
  for (const { crewId, start, end } of shifts.toSorted((a, b) => a.start - b.start)) {
    add(start, firm);
    add(end ?? Infinity, profileOf(crewId));
  }
  add(window.end, firm);
  return parts;
}
