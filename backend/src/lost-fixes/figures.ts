import type { Limits } from '@hubtack/contracts/lost-fixes/limits.js';
import { HOLD_MS } from '../fixes/timeline.js';
import { nextCorrections, noCorrectionsYet } from './corrections-watch.js';
import type { Evidence, EvidenceEpoch } from './diagnosis.js';

/** Figures that the rules look at. Absent is null. */
export interface Figures {
  satellitesBefore: number | null;
  satellitesAtLoss: number | null;
  hdopBefore: number | null;
  hdopAtLoss: number | null;
  /** Corrections were older than allowed when the fix went, or are now. */
  areCorrectionsLost: boolean;
  oldestAgeMs: number | null;
  medianAgeMs: number | null;
  /** Shares of the epochs since the loss. */
  floatShare: number;
  noneShare: number;
  usualQuality: number | null;
  lastEpochAt: number | null;
  /** The loss began with silence. */
  beganSilent: boolean;
  /** Since when nothing has been heard; null while it is. */
  silentSinceMs: number | null;
}

/** What the sky looked like when the fix went: this long around the start of the loss. */
const AT_LOSS_BEFORE_MS = 10_000;
const AT_LOSS_AFTER_MS = 60_000;
/** Silence that is more than a late sentence. */
const QUIET_AFTER_MS = 30_000;

/** Middle value, the lower of two: a number of satellites that was really there. */
export function middle(values: readonly (number | null)[]): number | null {
  const known = values.filter((value) => value !== null).toSorted((a, b) => a - b);
  return known.length === 0 ? null : known[(known.length - 1) >> 1]!;
}

function usual(values: readonly number[]): number | null {
  const counts = new Map<number, number>();
  for (const value of values) counts.set(value, (counts.get(value) ?? 0) + 1);
  return [...counts].toSorted((a, b) => b[1] - a[1])[0]?.[0] ?? null;
}

/** Corrections lost when the fix went, or now: an outage begun and over in between explains neither. */
function correctionsLost(evidence: Evidence, limits: Limits): { lost: boolean; oldestMs: number | null } {
  const correctionLimits = {
    maxAgeMs: limits.maxAgeSeconds * 1000,
    ageClearsMs: limits.ageClearsSeconds * 1000,
  };
  let state = noCorrectionsYet;
  let oldestMs: number | null = null;
  let lostAtLoss = false;
  for (const epoch of [...evidence.before, ...evidence.since]) {
    state = nextCorrections(state, epoch, correctionLimits);
    if (state.lostAt === null) continue;
    oldestMs = Math.max(oldestMs ?? 0, epoch.time - state.lostAt);
    const { time } = epoch;
    if (time >= evidence.start - AT_LOSS_BEFORE_MS / 2 && time <= evidence.start + AT_LOSS_AFTER_MS)
      lostAtLoss = true;
  }
  return { lost: lostAtLoss || state.lostAt !== null, oldestMs };
}

/** Nothing was heard when the fix went, for longer than a missing sentence or two. */
function hasBegunSilent({ start, before, since, now }: Evidence): boolean {
  const last = before.at(-1);
  if (!last) return false;
  const next = since[0]?.time ?? now;
  return last.time + HOLD_MS <= start && next - start >= HOLD_MS;
}

export function figuresOf(evidence: Evidence, limits: Limits): Figures {
  const { before, since, start, now } = evidence;
  const calm = before.filter(({ time }) => time < start - AT_LOSS_BEFORE_MS);
  const all: EvidenceEpoch[] = [...before, ...since];
  const atLoss = all.filter(
    ({ time }) => time >= start - AT_LOSS_BEFORE_MS / 2 && time < start + AT_LOSS_AFTER_MS,
  );
  const lost = correctionsLost(evidence, limits);
  const lastEpochAt = all.at(-1)?.time ?? null;
  const share = (qualities: readonly number[]) =>
    since.length === 0 ? 0 : since.filter(({ quality }) => qualities.includes(quality)).length / since.length;
  const isSilent = lastEpochAt !== null && now - lastEpochAt >= QUIET_AFTER_MS;
  return {
    satellitesBefore: middle(calm.map(({ satellites }) => satellites)),
    satellitesAtLoss: middle(atLoss.map(({ satellites }) => satellites)),
    hdopBefore: middle(calm.map(({ hdop }) => hdop)),
    hdopAtLoss: middle(atLoss.map(({ hdop }) => hdop)),
    areCorrectionsLost: lost.lost,
    oldestAgeMs: lost.oldestMs,
    medianAgeMs: middle(since.map(({ ageMs }) => ageMs)),
    floatShare: share([5]),
    noneShare: share([0, 6, 7, 8]),
    usualQuality: usual(since.map(({ quality }) => quality)),
    lastEpochAt,
    beganSilent: hasBegunSilent(evidence),
    silentSinceMs: isSilent ? lastEpochAt + HOLD_MS : null,
  };
}
