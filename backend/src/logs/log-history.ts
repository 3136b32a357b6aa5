import { setTimeout as wait } from 'node:timers/promises';
import { Injectable } from '@nestjs/common';
import { ProblemException } from '../common/problem.exception.js';
import { CommitQueue } from '../fixes/commit.queue.js';
import type { Written } from '../fixes/timeline.writer.js';
import { MetricsService } from '../metrics/metrics.service.js';
import type { EpochBatch } from './log-messages.js';

/**
 * So many epochs enter a second, at most: each second the figures of what came are worked out again on the thread that answers
 * rovers and boards, and that must stay short (bench `logs/history`).
 */
const MOST_EPOCHS_A_SECOND = 10_000;
/** Storage that is busy for longer than this is out of order. */
const MOST_TRIES = 60;

const pause = async (ms: number): Promise<void> => {
  if (ms > 0) await wait(ms, undefined, { ref: false });
};

/** Enters the epochs of a log into a rover's history, by the same queue as what rovers send: late sentences. */
@Injectable()
export class LogHistory {
  constructor(
    private readonly queue: CommitQueue,
    private readonly metrics: MetricsService,
  ) {}

  /** Ends when the batch is durable. Waits its turn while the storage is busy with what rovers send. */
  async store(roverId: number, { epochs, sigmas }: EpochBatch): Promise<Written> {
    const began = performance.now();
    for (let tries = 1; ; tries++) {
      try {
        const written = await this.queue.add(roverId, epochs, sigmas);
        this.metrics.epochsAccepted.inc(written.accepted);
        await pause(began + (epochs.length / MOST_EPOCHS_A_SECOND) * 1000 - performance.now());
        return written;
      } catch (error) {
        const seconds = error instanceof ProblemException ? error.extra.retryAfterSeconds : undefined;
        if (seconds === undefined || tries >= MOST_TRIES) throw error;
        await pause(seconds * 1000);
      }
    }
  }
}
