import type { Limits } from '@hubtack/contracts/lost-fixes/limits.js';
import { totalMs, clip, type Interval } from '../common/interval.js';
import { partition, type HeardSpan } from '../fixes/timeline.js';

/** Times of the detector in ms, as it reckons with them. */
export interface DetectorLimits {
  lostAfterMs: number;
  regainedAfterMs: number;
  firstFixWithinMs: number;
  heardWithinMs: number;
}

export const detectorLimitsOf = (limits: Limits): DetectorLimits => ({
  lostAfterMs: limits.lostAfterSeconds * 1000,
  regainedAfterMs: limits.regainedAfterSeconds * 1000,
  firstFixWithinMs: limits.firstFixWithinMinutes * 60_000,
  heardWithinMs: limits.heardWithinMinutes * 60_000,
});

/** A shift of one rover: when it counts. `end` null: not finished, runs to now. */
export interface DutyTime {
  end: number | null;
  /** Without pauses; what has not ended may reach past now. */
  onShift: readonly Interval[];
}

export type EpisodeKind = 'lostFix' | 'noFirstFix' | 'notHeard';

export interface Episode {
  kind: EpisodeKind;
  start: number;
  /** The first instant at which it was due and still so. */
  raisedAt: number;
  end: number | null;
  ending: 'regained' | 'shiftEnd' | null;
  /** Pauses between start and end (or now), taken off its length. */
  pausedMs: number;
}

/** A stretch of on-shift time, pauses left out, in which the rover is fixed all along or not at all. */
interface Run {
  isFixed: boolean;
  /** On-shift pieces, in order. */
  pieces: Interval[];
}

interface Gap {
  kind: EpisodeKind;
  start: number;
  /** Start of the fixed run, or of the first report, that ends it; null while nothing has. */
  end: number | null;
  limitMs: number;
}

/**
 * Episodes of one rover in one shift, in order of time, as they are known at `now` (design: "Lost-fix episode").
 * `spans`: heard spans of the rover, sorted. Thresholds are reckoned in on-shift time: a pause suspends.
 * The whole shift is worked out from its spans every time: nothing depends on what was known before, so sentences may come in any order.
 */
export function episodesOf(
  spans: readonly HeardSpan[],
  duty: DutyTime,
  now: number,
  limits: DetectorLimits,
): Episode[] {
  const until = Math.min(now, duty.end ?? now);
  const worked = clip(duty.onShift, { start: -Infinity, end: until });
  if (worked.length === 0) return [];
  const parts = worked.flatMap(({ start, end }) => partition(spans, start, end, now));
  const firstReport = parts.find(({ state }) => state !== 'silent')?.start ?? null;
  const runs = runsOf(parts);
  const isOver = duty.end !== null && duty.end <= now;
  return gapsOf(runs, worked[0]!.start, firstReport, limits)
    .map((gap) => episodeOf(gap, runs, worked, isOver ? duty.end : null))
    .filter((episode) => episode !== null);
}

/** First report of a shift, and the start of its first fix that holds; null while there is none. */
export function firstFixOf(
  spans: readonly HeardSpan[],
  duty: DutyTime,
  now: number,
  limits: Pick<DetectorLimits, 'regainedAfterMs'>,
): { reportedAt: number; fixedAt: number } | null {
  const worked = clip(duty.onShift, { start: -Infinity, end: Math.min(now, duty.end ?? now) });
  const parts = worked.flatMap(({ start, end }) => partition(spans, start, end, now));
  const report = parts.find(({ state }) => state !== 'silent');
  const fix = runsOf(parts).find((run) => run.isFixed && totalMs(run.pieces) >= limits.regainedAfterMs);
  return report && fix ? { reportedAt: report.start, fixedAt: startOf(fix) } : null;
}

function runsOf(parts: readonly { state: string; start: number; end: number }[]): Run[] {
  const runs: Run[] = [];
  for (const { state, start, end } of parts) {
    const isFixed = state === 'fixed';
    const last = runs.at(-1);
    if (last?.isFixed === isFixed) last.pieces.push({ start, end });
    else runs.push({ isFixed, pieces: [{ start, end }] });
  }
  return runs;
}

const startOf = (run: Run): number => run.pieces[0]!.start;
const endOf = (run: Run): number => run.pieces.at(-1)!.end;

/** Where the rover has no fix that holds: before the first report, before the first fix, and between fixes. */
function gapsOf(
  runs: readonly Run[],
  shiftStart: number,
  firstReport: number | null,
  limits: DetectorLimits,
): Gap[] {
  const gaps: Gap[] = [
    { kind: 'notHeard', start: shiftStart, end: firstReport, limitMs: limits.heardWithinMs },
  ];
  if (firstReport === null) return gaps;
  let gap: Gap | null = {
    kind: 'noFirstFix',
    start: firstReport,
    end: null,
    limitMs: limits.firstFixWithinMs,
  };
  for (const run of runs) {
    if (!run.isFixed || totalMs(run.pieces) < limits.regainedAfterMs) continue;
    if (gap) gaps.push({ ...gap, end: startOf(run) });
    gap = { kind: 'lostFix', start: endOf(run), end: null, limitMs: limits.lostAfterMs };
  }
  if (gap) gaps.push(gap);
  return gaps;
}

/** The gap as an episode, when it is one: long enough, and not fixed at some instant from then on. */
function episodeOf(
  gap: Gap,
  runs: readonly Run[],
  worked: readonly Interval[],
  shiftEnd: number | null,
): Episode | null {
  const { kind, start } = gap;
  const end = gap.end ?? shiftEnd;
  const until = end ?? worked.at(-1)!.end;
  const within = clip(worked, { start, end: until });
  const dueAt = instantAfter(within, gap.limitMs);
  if (dueAt === null || until <= start) return null;
  const due = kind === 'notHeard' ? dueAt : firstNotFixed(runs, dueAt, until);
  // Exactly as long as the limit and fixed from then on: long enough, though no instant is left to raise it at.
  const isJustLongEnough = gap.end !== null && totalMs(within) === gap.limitMs;
  if ((due === null || due >= until) && !isJustLongEnough) return null;
  const ending = gap.end !== null ? 'regained' : end !== null ? 'shiftEnd' : null;
  return {
    kind,
    start: within[0]!.start,
    raisedAt: Math.min(due ?? until, until),
    end,
    ending,
    pausedMs: until - within[0]!.start - totalMs(within),
  };
}

/** The instant at which so much on-shift time has passed; null when there is less. */
function instantAfter(within: readonly Interval[], ms: number): number | null {
  let left = ms;
  for (const { start, end } of within) {
    if (end - start >= left) return start + left;
    left -= end - start;
  }
  return null;
}

function firstNotFixed(runs: readonly Run[], from: number, until: number): number | null {
  for (const run of runs) {
    if (run.isFixed) continue;
    for (const piece of run.pieces)
      if (piece.end > from && piece.start < until) return Math.max(piece.start, from);
  }
  return null;
}
