import { setTimeout as wait } from 'node:timers/promises';
import { Injectable } from '@nestjs/common';
import { ProblemException } from '../common/problem.exception.js';
import { CommitQueue } from '../fixes/commit.queue.js';
import type { Written } from '../fixes/timeline.writer.js';
import { MetricsService } from '../metrics/metrics.service.js';
import type { EpochBatch } from './log-messages.js';

/** Storage that is busy for longer than this is out of order. */
const MOST_TRIES = 60;

/** Enters the epochs of a log into a rover's history, by the same queue as what rovers send: late sentences. */
@Injectable()
export class LogHistory {
  constructor(
    private readonly queue: CommitQueue,
    private readonly metrics: MetricsService,
  ) {}

  /** Ends when the batch is durable. Waits its turn while the storage is busy with what rovers send. */
  async store(roverId: number, { epochs, sigmas }: EpochBatch): Promise<Written> {
    for (let tries = 1; ; tries++) {
      try {
        const written = await this.queue.add(roverId, epochs, sigmas);
        this.metrics.epochsAccepted.inc(written.accepted);
        return written;
      } catch (error) {
        const seconds = error instanceof ProblemException ? error.extra.retryAfterSeconds : undefined;
        if (seconds === undefined || tries >= MOST_TRIES) throw error;
        await wait(seconds * 1000, undefined, { ref: false });
      }
    }
  }
}
