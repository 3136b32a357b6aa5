import type { LogDetail, LogSummary } from '@hubtack/contracts/logs/log.js';
import type { Limits } from '@hubtack/contracts/lost-fixes/limits.js';
import type { Epoch, LateSigmas } from '../fixes/epoch.js';
import type { TimeLimits } from '../ingest/time-limits.js';

/** What a thread is started with to read one log. */
export interface LogTask {
  path: string;
  bytes: number;
  /** When the file came, ms UTC. */
  receivedAt: number;
  /** UTC date of the first sentence, YYYY-MM-DD, when somebody said it. */
  date: string | null;
  limits: Limits;
  /** Of the rover's correction source as it is now; null without. */
  base: { latitude: number; longitude: number } | null;
  /** What may enter the rover's history; null: nothing is to. */
  history: TimeLimits | null;
}

/** Epochs for the rover's history, as they stand in the file. */
export interface EpochBatch {
  epochs: Epoch[];
  sigmas: LateSigmas[];
}

export interface RefusedEpochs {
  refused: number;
  reasons: string[];
}

/** From the thread. After `epochs` it waits for a `stored`: no more than one batch is on its way. */
export type FromThread =
  | { kind: 'progress'; progress: number }
  | ({ kind: 'epochs' } & EpochBatch)
  | { kind: 'done'; summary: LogSummary; detail: LogDetail; refused: RefusedEpochs }
  | { kind: 'failed'; problem: string };
export interface ToThread {
  kind: 'stored';
}
