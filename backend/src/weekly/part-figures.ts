import type { StateTotals } from '@hubtack/contracts/fixes/timeline.js';
import { addTotals, noTotals } from '@hubtack/contracts/fixes/totals.js';
import { clip, intersect, totalMs, type Interval } from '../common/interval.js';
import { partition, totalsOf, type HeardSpan } from '../fixes/timeline.js';
import { episodesOf, firstFixOf, type DetectorLimits } from '../lost-fixes/detector.js';

/** A rover-shift as a whole; `end` null: not finished. */
export interface FiguresShift {
  start: number;
  end: number | null;
  onShift: readonly Interval[];
}

/** Figures of the part of a rover-shift that lies on one local day (design: "Figures of a rover-shift"). */
export interface PartFigures {
  startAt: number;
  /** Null: the shift runs. */
  endAt: number | null;
  /** On-shift time by state; together all of it, exactly. */
  totals: StateTotals;
  withinToleranceMs: number;
  firstFixMs: number | null;
  /** Lost fixes that start in this part, and the lengths of those that have ended. */
  lostFixes: number;
  regains: number[];
}

/**
 * `spans`: heard spans over the whole shift; `within`: runs within the tolerance profile. What is still to come does not count. Null when none
 * of the shift has passed on this day.
 */
export function partFigures(
  shift: FiguresShift,
  day: Interval,
  spans: readonly HeardSpan[],
  within: readonly Interval[],
  now: number,
  limits: DetectorLimits,
): PartFigures | null {
  const until = Math.min(now, shift.end ?? now);
  const part = { start: Math.max(shift.start, day.start), end: Math.min(until, day.end) };
  const worked = clip(shift.onShift, part);
  if (worked.length === 0) return null;
  const totals = worked
    .map(({ start, end }) => totalsOf(partition(spans, start, end, now)))
    .reduce(addTotals, noTotals());
  const holds = (instant: number) => instant >= part.start && instant < part.end;
  const lost = episodesOf(spans, shift, now, limits).filter(
    ({ kind, start }) => kind === 'lostFix' && holds(start),
  );
  const firstFix = firstFixOf(spans, shift, now, limits);
  const isOver = shift.end !== null && shift.end <= day.end;
  return {
    startAt: part.start,
    endAt: isOver ? shift.end : now >= day.end ? day.end : null,
    totals,
    withinToleranceMs: totalMs(intersect(within, worked)),
    firstFixMs: firstFix && holds(firstFix.reportedAt) ? firstFix.fixedAt - firstFix.reportedAt : null,
    lostFixes: lost.length,
    regains: lost.flatMap(({ start, end, pausedMs }) => (end === null ? [] : [end - start - pausedMs])),
  };
}
