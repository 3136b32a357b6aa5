import { causes, type Cause } from '@hubtack/contracts/lost-fixes/cause.js';
import type { Limits } from '@hubtack/contracts/lost-fixes/limits.js';
import type { LostFixKind } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import type { Epoch } from '../fixes/epoch.js';
import { figuresOf, type Figures } from './figures.js';

export type EvidenceEpoch = Pick<Epoch, 'time' | 'quality' | 'satellites' | 'hdop' | 'ageMs' | 'stationId'>;

/** What is known about one loss, at the instant `now`. */
export interface Evidence {
  kind: Exclude<LostFixKind, 'mountPoint'>;
  start: number;
  now: number;
  /** The two minutes before the loss, and everything since (of a long loss its beginning and its newest part), sorted. */
  before: readonly EvidenceEpoch[];
  since: readonly EvidenceEpoch[];
  /** When corrections first came since the shift began (a quality of 4 or 5, or a base station id); null when they never did. */
  correctedAt: number | null;
  /** Distance to the base, metres; null when one of the two is not known. */
  baseDistanceM: number | null;
  /** The mount point has failed for everyone on it: how many rovers of how many. */
  outage: { rovers: number; reporting: number; mountPoint: string } | null;
  /** Checks of the correction source find it down, since this instant. */
  sourceDown: { since: number; mountPoint: string } | null;
}

export interface Verdict {
  cause: Cause;
  /** In words, for people who know their trade. */
  evidence: string[];
  /** The next explanation that also holds; null when none does. */
  runnerUp: Cause | null;
}

type Rule = (evidence: Evidence, figures: Figures, limits: Limits) => string[] | null;

/** Corrections that have come this short a time ago are the end of their absence. */
const JUST_CAME_MS = 60_000;
/** Who has lost a fix had corrections to fix it with. */
const hadCorrections = ({ kind, correctedAt, now }: Evidence): boolean =>
  kind === 'lostFix' || (correctedAt !== null && now - correctedAt > JUST_CAME_MS);

const seconds = (ms: number): string => `${Math.round(ms / 1000)} s`;
const kilometres = (metres: number): string => `${(metres / 1000).toFixed(1)} km`;

/** A fall in satellites by this share counts as a blocked sky (common practice, no source). */
const SATELLITES_FALL = 0.3;
/** Most of the epochs since the loss. */
const MOST = 0.5;

const ageIsGood = (figures: Figures): string =>
  figures.medianAgeMs === null
    ? 'corrections: age not reported'
    : `corrections good (age ${seconds(figures.medianAgeMs)})`;

const satellites = ({ satellitesBefore: before, satellitesAtLoss: at }: Figures): string | null => {
  if (at === null) return null;
  return before === null ? `${at} satellites` : `satellites ${before} → ${at}`;
};

const skyIsBlocked: Rule = (_evidence, figures, limits) => {
  if (figures.areCorrectionsLost) return null;
  const { satellitesBefore: before, satellitesAtLoss: at, hdopAtLoss: hdop, hdopBefore } = figures;
  const hasFew = at !== null && at < limits.minSatellites;
  const hasFallen = at !== null && before !== null && at <= before * (1 - SATELLITES_FALL);
  const isSpread = hdop !== null && hdop > limits.maxHdop;
  if (!hasFew && !hasFallen && !isSpread) return null;
  const found = [satellites(figures)];
  if (hdop !== null) found.push(hdopBefore === null ? `HDOP ${hdop}` : `HDOP ${hdopBefore} → ${hdop}`);
  found.push(ageIsGood(figures));
  return found.filter((line) => line !== null);
};

/** One rule for each cause, in the order of `causes`: what is further up the chain wins. Null: does not hold. */
const rules: Record<Cause, Rule> = {
  mountPointDown: ({ outage, sourceDown, now }, figures) => {
    if (!(outage ?? sourceDown) || !figures.areCorrectionsLost) return null;
    const found: string[] = [];
    if (outage)
      found.push(
        `${outage.rovers} of ${outage.reporting} rovers on ${outage.mountPoint} lost their corrections together`,
      );
    if (sourceDown)
      found.push(
        `checks of ${sourceDown.mountPoint} find it down for ${Math.max(1, Math.round((now - sourceDown.since) / 60_000))} min`,
      );
    if (figures.oldestAgeMs !== null) found.push(`age up to ${seconds(figures.oldestAgeMs)}`);
    return found;
  },
  wentQuiet: ({ kind, now }, { beganSilent, silentSinceMs, lastEpochAt }) => {
    if (kind === 'notHeard' || lastEpochAt === null) return null;
    if (!beganSilent && silentSinceMs === null) return null;
    return silentSinceMs === null
      ? ['nothing was heard when the fix was lost; it has come back since']
      : [`nothing heard for ${seconds(now - lastEpochAt)}`];
  },
  notHeard: ({ kind, start, now }) =>
    kind === 'notHeard'
      ? [`nothing heard since the shift began ${Math.floor((now - start) / 60_000)} min ago`]
      : null,
  neverCorrected: (evidence, figures) =>
    !hadCorrections(evidence) && evidence.since.length > 0 && figures.noneShare < MOST
      ? [
          `no corrections since the shift began: quality ${figures.usualQuality}, no base station id`,
          ...[satellites(figures)].filter((line) => line !== null),
        ]
      : null,
  correctionsStopped: (evidence, figures, limits) => {
    if (!hadCorrections(evidence) || !figures.areCorrectionsLost) return null;
    return figures.oldestAgeMs === null
      ? ['the age of corrections is no longer reported']
      : [
          `age of corrections rose to ${seconds(figures.oldestAgeMs)} (limit ${limits.maxAgeSeconds} s) while the rover went on reporting`,
        ];
  },
  noPosition: (_evidence, figures) =>
    figures.noneShare >= MOST
      ? [`quality 0 in ${Math.round(figures.noneShare * 100)} % of the epochs since the loss`]
      : null,
  skyBlocked: skyIsBlocked,
  farFromBase: ({ baseDistanceM }, figures, limits) =>
    baseDistanceM !== null &&
    baseDistanceM > limits.maxBaselineKm * 1000 &&
    !figures.areCorrectionsLost &&
    figures.floatShare > 0
      ? [`${kilometres(baseDistanceM)} to the base (limit ${limits.maxBaselineKm} km)`, ageIsGood(figures)]
      : null,
  notResolving: (_evidence, figures) =>
    figures.floatShare >= MOST && !figures.areCorrectionsLost
      ? ['float', ageIsGood(figures), ...[satellites(figures)].filter((line) => line !== null)]
      : null,
  unclear: ({ before, since }) =>
    before.length + since.length === 0 ? ['no sentences of that time are kept'] : ['the evidence is mixed'],
};

/**
 * Likely cause of a loss with its evidence, and the runner-up (design: "Why was the fix lost?"). Advice: a person confirms. Limits and shares are
 * common practice, no source; the firm may set the limits.
 */
export function diagnose(evidence: Evidence, limits: Limits): Verdict {
  const figures = figuresOf(evidence, limits);
  const holding = causes
    .map((cause) => ({ cause, evidence: rules[cause](evidence, figures, limits) }))
    .filter((found): found is { cause: Cause; evidence: string[] } => found.evidence !== null);
  const [first, second] = holding as [{ cause: Cause; evidence: string[] }, (typeof holding)[number]?];
  return {
    ...first,
    // "Unclear" is what is left when nothing holds, and no explanation beside another.
    runnerUp: second && second.cause !== 'unclear' ? second.cause : null,
  };
}
