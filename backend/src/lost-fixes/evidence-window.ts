import type { Interval } from '../common/interval.js';
import type { Episode } from './detector.js';

const BEFORE_MS = 120_000;
/** Of a long loss, its first minutes and its newest say what there is to say. */
const FIRST_MS = 5 * 60_000;
const NEWEST_MS = 10 * 60_000;

/** What is looked at to explain a loss that lasts to `until`, ms: times before it, and since. */
export function evidenceWindow(
  { kind, start }: Pick<Episode, 'kind' | 'start'>,
  shiftStart: number,
  until: number,
): { before: Interval | null; since: Interval[] } {
  const isLong = until - start > FIRST_MS + NEWEST_MS;
  return {
    before: kind === 'notHeard' ? null : { start: Math.max(start - BEFORE_MS, shiftStart), end: start },
    since: isLong
      ? [
          { start, end: start + FIRST_MS },
          { start: until - NEWEST_MS, end: until },
        ]
      : [{ start, end: until }],
  };
}
