import type { Lane, LaneChange, RibbonSpan } from '@hubtack/contracts/board/lane.js';
import type { FixState } from '@hubtack/contracts/fixes/fix-state.js';
import type { StateTotals } from '@hubtack/contracts/fixes/timeline.js';
import type { AgainReason } from '@hubtack/contracts/set-up/check-shot.js';
import { noTotals } from '@hubtack/contracts/fixes/totals.js';
import { clip, intersect, totalMs, type Interval } from '../common/interval.js';
import type { Epoch } from '../fixes/epoch.js';
import { HOLD_MS, clipSpans, totalsOf, type HeardSpan } from '../fixes/timeline.js';
import { dutyAt, type CrewDay } from '../shifts/on-shift.js';
import type { RoverBadge } from '../set-up/rover-badges.repository.js';
import type { RosterEntry } from '../rovers/roster.repository.js';

/** How far back the ribbon reaches. */
export const RIBBON_MS = 3_600_000;

export interface LaneFacts {
  entry: RosterEntry;
  day: Interval;
  crewDay: CrewDay;
  /** Heard spans since the start of the day or of the ribbon, the growing one last. */
  spans: readonly HeardSpan[];
  latest: Epoch | null;
  baseDistanceM: number | null;
  /** Set-up card and check shot; null when there is neither. */
  badge: RoverBadge | null;
  /** Why the check shot does not count any more. */
  again: AgainReason | null;
}

/** State at an instant, and since when. A rover is silent from H after its newest epoch on. */
export function stateAt(
  spans: readonly HeardSpan[],
  now: number,
): { state: FixState; since: number | null; heldUntil: number | null } {
  const last = spans.at(-1);
  if (!last) return { state: 'silent', since: null, heldUntil: null };
  return now < last.end
    ? { state: last.state, since: last.start, heldUntil: last.end }
    : { state: 'silent', since: last.end, heldUntil: last.end };
}

/** On-shift time up to `now`: what is to come does not count. */
function onShiftUntil(facts: LaneFacts, now: number): Interval[] {
  const start = Math.max(facts.day.start, facts.entry.assignedAt ?? facts.day.start);
  const window = { start, end: Math.min(now, facts.day.end) };
  if (window.end <= window.start) return [];
  if (facts.crewDay.basis !== 'noShiftSet') return clip(facts.crewDay.onShift, window);
  const heard = clipSpans(facts.spans, window.start, window.end);
  return heard.length === 0 ? [] : [{ start: heard[0]!.start, end: heard.at(-1)!.end }];
}

/** On-shift time of today by state; the states add up to it exactly. */
export function todayTotals(facts: LaneFacts, now: number): StateTotals {
  const onShift = onShiftUntil(facts, now);
  const totals = noTotals();
  if (onShift.length === 0) return totals;
  for (const state of ['fixed', 'float', 'code', 'none'] as const) {
    const heard = facts.spans.filter((span) => span.state === state);
    totals[`${state}Ms`] = totalMs(intersect(heard, onShift));
  }
  const { fixedMs, floatMs, codeMs, noneMs } = totals;
  totals.silentMs = totalMs(onShift) - fixedMs - floatMs - codeMs - noneMs;
  return totals;
}

/** Spans of the last hour, since the crew has the rover. */
function ribbonOf(facts: LaneFacts, now: number): RibbonSpan[] {
  const from = Math.max(now - RIBBON_MS, facts.entry.assignedAt ?? 0);
  return clipSpans(facts.spans, from, Math.max(now, from) + HOLD_MS);
}

export function laneChangeOf(facts: LaneFacts, now: number, withRibbon: boolean): LaneChange {
  const { latest } = facts;
  const { state, since, heldUntil } = stateAt(facts.spans, now);
  const change: LaneChange = {
    id: facts.entry.roverId,
    state,
    since,
    heldUntil,
    lastEpochAt: latest?.time ?? (heldUntil === null ? null : heldUntil - HOLD_MS),
    satellites: latest?.satellites ?? null,
    ageMs: latest?.ageMs ?? null,
    hdop: latest?.hdop ?? null,
    stationId: latest?.stationId ?? null,
    latitude: latest?.latitude ?? null,
    longitude: latest?.longitude ?? null,
    baseDistanceM: facts.baseDistanceM,
    duty: dutyAt(facts.crewDay, now),
    today: todayTotals(facts, now),
    todayAsOf: now,
  };
  if (withRibbon) change.ribbon = ribbonOf(facts, now);
  return change;
}

export function laneOf(facts: LaneFacts, now: number): Lane {
  const { entry, badge } = facts;
  return {
    ...laneChangeOf(facts, now, false),
    ribbon: ribbonOf(facts, now),
    roverLabel: entry.roverLabel,
    crewId: entry.crewId,
    crewName: entry.crewName,
    crewPhone: entry.crewPhone,
    siteName: entry.siteName,
    mountPoint: entry.mountPoint,
    setUp: badge?.card ? { at: badge.card.at, by: badge.card.by, poleHeightM: badge.card.poleHeightM } : null,
    checkShot: badge?.shot
      ? {
          at: badge.shot.at,
          horizontalMm: Math.round(badge.shot.horizontalM * 1000),
          passed: badge.shot.passed,
          again: facts.again,
        }
      : null,
    pauses: clip(facts.crewDay.pauses, { start: now - RIBBON_MS, end: now }),
  };
}

/** Totals of on-shift time by local hour, for the chart of the day. */
export function hourTotals(facts: LaneFacts, now: number): { start: number; totals: StateTotals }[] {
  const onShift = onShiftUntil(facts, now);
  const hours = [];
  for (let start = facts.day.start; start < Math.min(now, facts.day.end); start += RIBBON_MS) {
    const hour = clip(onShift, { start, end: start + RIBBON_MS });
    const totals = totalsOf(
      facts.spans.flatMap(({ state, ...span }) =>
        intersect([span], hour).map((part) => ({ state, ...part })),
      ),
    );
    const { fixedMs, floatMs, codeMs, noneMs } = totals;
    totals.silentMs = totalMs(hour) - fixedMs - floatMs - codeMs - noneMs;
    if (totalMs(hour) > 0) hours.push({ start, totals });
  }
  return hours;
}
