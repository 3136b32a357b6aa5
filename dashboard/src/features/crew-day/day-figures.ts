import type { FixState } from '@hubtack/contracts/fixes/fix-state.js';
import type { StateTotals } from '@hubtack/contracts/fixes/timeline.js';
import { noTotals, totalOf } from '@hubtack/contracts/fixes/totals.js';
import type { CrewDayView } from '@hubtack/contracts/shifts/shift.js';

interface Interval {
  start: number;
  end: number;
}

/** On-shift time of a rover up to now: where no shift is set, from the first to the last heard instant. */
export function workedOf(day: CrewDayView, spans: readonly Interval[], now: number): Interval[] {
  const worked =
    day.basis === 'noShiftSet' && spans.length > 0
      ? [{ start: spans[0]!.start, end: spans.at(-1)!.end }]
      : day.onShift;
  return worked
    .map(({ start, end }) => ({ start, end: Math.min(end, now) }))
    .filter(({ start, end }) => end > start);
}

/** Worked time by state; what no span covers is silent, so that the states add up to it exactly. */
export function dayTotals(
  worked: readonly Interval[],
  spans: readonly (Interval & { state: FixState })[],
): StateTotals {
  const totals = noTotals();
  for (const { start, end } of worked) {
    let heard = 0;
    for (const span of spans) {
      const ms = Math.max(0, Math.min(end, span.end) - Math.max(start, span.start));
      totals[totalOf[span.state]] += ms;
      heard += ms;
    }
    totals.silentMs += end - start - heard;
  }
  return totals;
}

/** Time between the first and the last of what was worked: what the ribbon shows, with a little on either side. */
export function windowOf(worked: readonly Interval[], day: CrewDayView): Interval {
  const first = worked[0];
  const last = worked.at(-1);
  if (!first || !last) return { start: day.dayStart, end: day.dayEnd };
  const margin = 5 * 60_000;
  return { start: first.start - margin, end: last.end + margin };
}

/** Gaps between stretches of work: the pauses. */
export const pausesOf = (worked: readonly Interval[]): Interval[] =>
  worked.slice(1).map((next, index) => ({ start: worked[index]!.end, end: next.start }));
