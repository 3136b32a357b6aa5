import type { Lane } from '@hubtack/contracts/board/lane.js';
import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { lostFixOfRover } from '../../live/lost-fix-of-rover';
import { stateNow } from '../../live/lane-figures';

/** How much somebody in the office is needed, the most first (design: "The board"). */
export const needs = ['flagged', 'lost', 'noFirstFix', 'quiet', 'unstable', 'well', 'offShift'] as const;
export type Need = (typeof needs)[number];

const UNSTABLE_CHANGES = 3;
const UNSTABLE_WITHIN_MS = 10 * 60_000;
/** Where no shift is set, silence this long means that nobody is working with the rover. */
const AWAY_MS = 3_600_000;
/** Silence on shift for this long: call the crew. */
export const CALL_AFTER_MS = 10 * 60_000;

export interface NeedOfLane {
  need: Need;
  /** Since when, ms; null when never heard. */
  since: number | null;
}

export function needOf(lane: Lane, now: number, lostFix?: LostFix): NeedOfLane {
  if (lostFix?.flag) return { need: 'flagged', since: lostFix.flag.at };
  const { state, since } = stateNow(lane, now);
  const isAway =
    lane.duty === 'noShiftSet' && state === 'silent' && (since === null || now - since > AWAY_MS);
  if (lane.duty === 'offShift' || lane.duty === 'paused' || isAway) return { need: 'offShift', since };
  if (state === 'silent') return { need: 'quiet', since };
  if (state !== 'fixed') return { need: lane.today.fixedMs > 0 ? 'lost' : 'noFirstFix', since };
  const changes = lane.ribbon.filter(({ start }) => start > now - UNSTABLE_WITHIN_MS).length;
  return { need: changes >= UNSTABLE_CHANGES ? 'unstable' : 'well', since };
}

/** Lanes by need, within those the longest first; crews that are well stand by name, so that the eye finds them. */
export function inOrderOfNeed(
  lanes: Iterable<Lane>,
  lostFixes: ReadonlyMap<number, LostFix>,
  now: number,
): Lane[] {
  const ranked = [...lanes].map((lane) => ({
    lane,
    ...needOf(lane, now, lostFixOfRover(lostFixes.values(), lane.id)),
  }));
  const name = (lane: Lane) => `${lane.crewName ?? '\uffff'} ${lane.roverLabel}`;
  ranked.sort((a, b) => {
    const byNeed = needs.indexOf(a.need) - needs.indexOf(b.need);
    if (byNeed !== 0) return byNeed;
    const isCalm = a.need === 'well' || a.need === 'offShift';
    const byTime = isCalm ? 0 : (a.since ?? 0) - (b.since ?? 0);
    return byTime !== 0 ? byTime : name(a.lane).localeCompare(name(b.lane));
  });
  return ranked.map(({ lane }) => lane);
}
