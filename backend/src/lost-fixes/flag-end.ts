import type { HeardSpan } from '../fixes/timeline.js';

/**
 * When a flag that no lost fix came of is over: once the rover has been fixed for `heldMs` after it (from the start of that run), or with the
 * shift; null while neither.
 */
export function flagEnd(
  flagAt: number,
  spans: readonly HeardSpan[],
  shiftEnd: number | null,
  now: number,
  heldMs: number,
): { at: number; ending: 'regained' | 'shiftEnd' } | null {
  for (const span of spans) {
    if (span.state !== 'fixed') continue;
    const start = Math.max(span.start, flagAt);
    if (Math.min(span.end, now) - start >= heldMs) return { at: start, ending: 'regained' };
  }
  return shiftEnd !== null && shiftEnd <= now && shiftEnd > flagAt
    ? { at: shiftEnd, ending: 'shiftEnd' }
    : null;
}
