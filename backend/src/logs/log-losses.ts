import type { LogLoss } from '@hubtack/contracts/logs/log.js';
import type { Limits } from '@hubtack/contracts/lost-fixes/limits.js';
import type { HeardSpan } from '../fixes/timeline.js';
import { detectorLimitsOf, episodesOf } from '../lost-fixes/detector.js';
import { diagnose } from '../lost-fixes/diagnosis.js';
import { evidenceWindow } from '../lost-fixes/evidence-window.js';
import type { EpochColumns } from './epoch-columns.js';
import type { LogFigures } from './log-figures.js';

const MOST_LOSSES = 200;

/** Beside the log itself: how far its rover was from the base. */
interface Surroundings {
  limits: Limits;
  /** Metres; null when one of the two places is not known. */
  baseDistanceM: number | null;
}

/**
 * Losses of a log with their likely causes, by the rules of the board: on shift from the first epoch to the last. Other rovers are not known here, so
 * no mount point is found down.
 */
export function lossesOf(
  columns: EpochColumns,
  spans: readonly HeardSpan[],
  { correctedAt }: Pick<LogFigures, 'correctedAt'>,
  { limits, baseDistanceM }: Surroundings,
): { losses: LogLoss[]; more: number } {
  if (columns.count === 0) return { losses: [], more: 0 };
  const [first, last] = [columns.time(0), columns.time(columns.count - 1)];
  const duty = { end: null, onShift: [{ start: first, end: last }] };
  const episodes = episodesOf(spans, duty, last, detectorLimitsOf(limits));
  const losses = episodes.slice(0, MOST_LOSSES).map(({ kind, start, end }) => {
    const now = end ?? last;
    const window = evidenceWindow({ kind, start }, first, now);
    const verdict = diagnose(
      {
        kind,
        start,
        now,
        before: window.before ? columns.between(window.before.start, window.before.end) : [],
        since: window.since.flatMap((part) => columns.between(part.start, part.end)),
        correctedAt: correctedAt !== null && correctedAt < now ? correctedAt : null,
        baseDistanceM,
        outage: null,
        sourceDown: null,
      },
      limits,
    );
    return {
      start: new Date(start).toISOString(),
      end: end === null ? null : new Date(end).toISOString(),
      cause: verdict.cause,
      evidence: verdict.evidence.map((line) => line.replace('since the shift began', 'since the log begins')),
    };
  });
  return { losses, more: episodes.length - losses.length };
}
