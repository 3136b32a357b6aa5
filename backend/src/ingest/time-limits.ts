import type { RejectReason } from '@hubtack/contracts/ingest/ingest.js';
import { DAY_MS } from '@hubtack/contracts/nmea/sentence.js';

/** Clocks differ; what claims to be later than this after its arrival is a wrong clock or a wrong date. */
export const FUTURE_SLACK_MS = 5 * 60_000;

export interface TimeLimits {
  now: number;
  /** Raw epochs older than this have been given up, so the timeline could not be worked out again. */
  rawEpochDays: number;
}

/** Why an epoch of this time cannot be taken; null when it can. */
export function refusalOf(time: number, limits: TimeLimits): { code: RejectReason; detail: string } | null {
  if (time > limits.now + FUTURE_SLACK_MS)
    return {
      code: 'inFuture',
      detail: `${new Date(time).toISOString()} is more than 5 min ahead of the server`,
    };
  if (time < limits.now - limits.rawEpochDays * DAY_MS)
    return {
      code: 'tooOld',
      detail: `${new Date(time).toISOString()} is older than the ${limits.rawEpochDays} days that are kept`,
    };
  return null;
}
