import { Inject, Injectable } from '@nestjs/common';
import type { IngestAnswer } from '@hubtack/contracts/ingest/ingest.js';
import { DAY_MS } from '@hubtack/contracts/nmea/sentence.js';
import { Clock } from '../common/clock.js';
import { ProblemException } from '../common/problem.exception.js';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import { CommitQueue } from '../fixes/commit.queue.js';
import type { Written } from '../fixes/timeline.writer.js';
import { MetricsService } from '../metrics/metrics.service.js';
import { readEpochs } from './epoch.json.js';
import { SentenceBatch, answerOf, type ReadOut, type Reject } from './sentence.batch.js';
import type { TimeLimits } from './time-limits.js';

const nothingWritten: Written = { accepted: 0, duplicates: 0 };

/** Takes what a rover sends, by whichever way, through to durable epochs. */
@Injectable()
export class IngestService {
  private readonly rawEpochDays: number;

  constructor(
    @Inject(ENVIRONMENT) environment: Environment,
    private readonly queue: CommitQueue,
    private readonly clock: Clock,
    private readonly metrics: MetricsService,
  ) {
    this.rawEpochDays = environment.RAW_EPOCH_DAYS;
  }

  /** A whole post of sentences. Answers after its epochs are durable; 400 when nothing in it could be read. */
  async sentences(roverId: number, body: Uint8Array, date: string | undefined): Promise<IngestAnswer> {
    const batch = new SentenceBatch(date === undefined ? null : Date.parse(date) / DAY_MS);
    batch.push(body, this.clock.now());
    batch.finish();
    const read = batch.take(this.limits());
    if (read.readable === 0) {
      this.count(read.rejects);
      const first = read.rejects[0];
      throw new ProblemException(
        400,
        'unreadable',
        first
          ? `No sentence could be read. Line ${first.line}: ${first.detail}.`
          : 'There is no sentence in it.',
      );
    }
    return answerOf(read, await this.store(roverId, read));
  }

  /** A post of epochs as JSON. */
  async epochs(roverId: number, bodies: readonly unknown[]): Promise<IngestAnswer> {
    const { epochs, rejects } = readEpochs(bodies, this.limits());
    if (epochs.length === 0 && rejects.every((reject) => reject.code.startsWith('bad'))) {
      this.count(rejects);
      const first = rejects[0];
      throw new ProblemException(
        400,
        'unreadable',
        first ? `No epoch could be read. Epoch ${first.line}: ${first.detail}.` : 'There is no epoch in it.',
      );
    }
    const read: ReadOut = { epochs, rejects, sigmas: [], readable: epochs.length, ignored: 0 };
    return answerOf(read, await this.store(roverId, read));
  }

  /** Stores what was read; the promise ends when it is durable. */
  async store(roverId: number, read: ReadOut): Promise<Written> {
    this.count(read.rejects);
    if (read.epochs.length === 0 && read.sigmas.length === 0) return nothingWritten;
    const written = await this.queue.add(roverId, read.epochs, read.sigmas);
    this.metrics.epochsAccepted.inc(written.accepted);
    return written;
  }

  limits(): TimeLimits {
    return { now: this.clock.now(), rawEpochDays: this.rawEpochDays };
  }

  private count(rejects: readonly Reject[]): void {
    for (const { code } of rejects) this.metrics.rejects.inc({ reason: code });
  }
}
