import { fixStateOfQuality, type FixState, type HeardState } from '@hubtack/contracts/fixes/fix-state.js';
import type { StateTotals } from '@hubtack/contracts/fixes/timeline.js';
import { noTotals, totalOf } from '@hubtack/contracts/fixes/totals.js';

/** An epoch speaks for at most this long: hold time H, ms. */
export const HOLD_MS = 10_000;

/** A maximal run of one heard state, [start, end) in ms UTC. Silence is what no span covers. */
export interface HeardSpan {
  state: HeardState;
  start: number;
  end: number;
}

export interface TimelineSpan {
  state: FixState;
  start: number;
  end: number;
}

export interface TimedQuality {
  time: number;
  quality: number;
}

/** The newest run of a rover, still growing: it covers [start, lastTime + H) until another epoch says otherwise. */
export interface Tail {
  state: HeardState;
  start: number;
  lastTime: number;
}

/** Stored spans that overlap or touch [from, to] with the growing run, whose stored row lags, as it really stands. */
export function withTail(
  stored: readonly HeardSpan[],
  tail: Tail | null,
  from: number,
  to: number,
): HeardSpan[] {
  if (!tail) return [...stored];
  const spans = stored.filter((span) => span.start !== tail.start);
  const grown = spanOfTail(tail);
  if (grown.end >= from && grown.start <= to) spans.push(grown);
  return spans;
}

export interface Step {
  tail: Tail;
  /** The run that this epoch ended, if it did. */
  closed: HeardSpan | null;
}

export const spanOfTail = (tail: Tail): HeardSpan => ({
  state: tail.state,
  start: tail.start,
  end: tail.lastTime + HOLD_MS,
});

/**
 * The timeline moves by one epoch that is newer than all before it.
 * Throws when it is not: such an epoch goes through `splice`.
 */
export function step(tail: Tail | null, epoch: TimedQuality): Step {
  const state = fixStateOfQuality(epoch.quality);
  const { time } = epoch;
  if (tail === null) return { tail: { state, start: time, lastTime: time }, closed: null };
  if (time <= tail.lastTime) throw new RangeError('step takes epochs in order of time');
  const heldUntil = tail.lastTime + HOLD_MS;
  if (state === tail.state && time <= heldUntil)
    return { tail: { state, start: tail.start, lastTime: time }, closed: null };
  return {
    tail: { state, start: time, lastTime: time },
    closed: { state: tail.state, start: tail.start, end: Math.min(time, heldUntil) },
  };
}

/** Spans of epochs sorted by time, one per time. The obvious computation that all others must equal. */
export function spansOf(epochs: readonly TimedQuality[]): HeardSpan[] {
  const spans: HeardSpan[] = [];
  let tail: Tail | null = null;
  for (const epoch of epochs) {
    const next: Step = step(tail, epoch);
    if (next.closed) spans.push(next.closed);
    tail = next.tail;
  }
  if (tail) spans.push(spanOfTail(tail));
  return spans;
}

/**
 * Replaces what `spans` say over [start, end) by `replacement` (sorted, inside the window), and joins neighbours
 * of one state that touch. Late epochs between `first` and `last` change nothing outside [first, last + H): the epoch
 * before keeps its own state up to `first`, and no epoch reaches further than H.
 */
export function splice(
  spans: readonly HeardSpan[],
  window: { start: number; end: number },
  replacement: readonly HeardSpan[],
): HeardSpan[] {
  const pieces: HeardSpan[] = [];
  for (const span of spans) {
    if (span.start < window.start)
      pieces.push({ state: span.state, start: span.start, end: Math.min(span.end, window.start) });
  }
  pieces.push(...replacement);
  for (const span of spans) {
    if (span.end > window.end)
      pieces.push({ state: span.state, start: Math.max(span.start, window.end), end: span.end });
  }
  return joinTouching(pieces);
}

function joinTouching(spans: readonly HeardSpan[]): HeardSpan[] {
  const joined: HeardSpan[] = [];
  for (const span of spans) {
    const last = joined.at(-1);
    if (last && last.state === span.state && last.end === span.start) last.end = span.end;
    else joined.push({ ...span });
  }
  return joined;
}

/** Spans cut to [from, to). */
export function clipSpans<T extends { start: number; end: number }>(
  spans: readonly T[],
  from: number,
  to: number,
): T[] {
  return spans
    .filter((span) => span.end > from && span.start < to)
    .map((span) => ({ ...span, start: Math.max(span.start, from), end: Math.min(span.end, to) }));
}

/**
 * Partition of [from, to) into states: no gap, no overlap, neighbours differ. Whatever no span covers is silent,
 * and nothing is known past `now`: an epoch holds until min(now, t + H).
 */
export function partition(
  spans: readonly HeardSpan[],
  from: number,
  to: number,
  now: number,
): TimelineSpan[] {
  const parts: TimelineSpan[] = [];
  let at = from;
  for (const span of clipSpans(spans, from, Math.min(to, now))) {
    if (span.start > at) parts.push({ state: 'silent', start: at, end: span.start });
    parts.push(span);
    at = span.end;
  }
  if (at < to) parts.push({ state: 'silent', start: at, end: to });
  return parts;
}

/** Adds up the time of each state. */
export function totalsOf(parts: readonly { state: FixState; start: number; end: number }[]): StateTotals {
  const totals = noTotals();
  for (const part of parts) totals[totalOf[part.state]] += part.end - part.start;
  return totals;
}
