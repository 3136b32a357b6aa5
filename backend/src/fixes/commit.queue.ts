import { Inject, Injectable, type OnApplicationShutdown } from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { Subject } from 'rxjs';
import { ProblemException } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';
import { MetricsService } from '../metrics/metrics.service.js';
import type { Epoch, LateSigmas } from './epoch.js';
import { TimelineWriter, type RoverChange, type Written } from './timeline.writer.js';

interface Batch {
  roverId: number;
  epochs: readonly Epoch[];
  sigmas: readonly LateSigmas[];
  resolve: (written: Written) => void;
  reject: (error: unknown) => void;
}

/** Epochs in one transaction: bounds how long the thread is away from its sockets. */
const MAX_EPOCHS_A_COMMIT = 20_000;
/** Epochs that may wait, of all rovers and of one: beyond that, senders are told to come back. */
const MAX_WAITING = 400_000;
const MAX_WAITING_OF_A_ROVER = 100_000;

/**
 * Group commit: what has queued while the last commit ran shares the next transaction, and each sender is answered
 * only after it is durable (WAL, synchronous FULL). No fixed wait: an idle server answers in one commit time.
 */
@Injectable()
export class CommitQueue implements OnApplicationShutdown {
  private batches: Batch[] = [];
  private waiting = 0;
  private readonly waitingOf = new Map<number, number>();
  private scheduled = false;
  private stopping = false;
  private readonly committed = new Subject<RoverChange[]>();
  /** After each commit: which rovers changed. */
  readonly changes = this.committed.asObservable();
  private readonly client;

  constructor(
    @Inject(DATABASE) database: HubtackDatabase,
    private readonly writer: TimelineWriter,
    private readonly metrics: MetricsService,
  ) {
    this.client = database.$client;
  }

  /**
   * Resolves once everything in the batch is on disk. Rejects with a ProblemException: 429 when this rover, 503 when the server has
   * too much waiting, 503 when the disk is full or the database locked; nothing of the batch is kept then.
   */
  add(roverId: number, epochs: readonly Epoch[], sigmas: readonly LateSigmas[] = []): Promise<Written> {
    const ofRover = this.waitingOf.get(roverId) ?? 0;
    if (this.stopping) throw new ProblemException(503, 'stopping', 'The server is stopping. Send it again.');
    if (ofRover > MAX_WAITING_OF_A_ROVER)
      throw new ProblemException(429, 'tooManyRequests', 'This rover sends faster than can be stored.', {
        retryAfterSeconds: 2,
      });
    if (this.waiting > MAX_WAITING)
      throw new ProblemException(503, 'storageBusy', 'Too much is waiting to be stored.', {
        retryAfterSeconds: 2,
      });
    return new Promise((resolve, reject) => {
      this.batches.push({ roverId, epochs, sigmas, resolve, reject });
      this.waiting += epochs.length;
      this.waitingOf.set(roverId, ofRover + epochs.length);
      this.metrics.commitQueue.set(this.waiting);
      this.schedule();
    });
  }

  /** Stores what waits and takes nothing more. */
  onApplicationShutdown(): void {
    this.stopping = true;
    while (this.batches.length > 0) this.commitOnce();
  }

  private schedule(): void {
    if (this.scheduled) return;
    this.scheduled = true;
    // After the sockets of this turn have been read: their posts join.
    setImmediate(() => {
      this.scheduled = false;
      this.commitOnce();
      if (this.batches.length > 0) this.schedule();
    });
  }

  private takeGroup(): Batch[] {
    let count = 0;
    let at = 0;
    while (at < this.batches.length && (at === 0 || count < MAX_EPOCHS_A_COMMIT)) {
      count += this.batches[at]!.epochs.length;
      at++;
    }
    const group = this.batches.slice(0, at);
    this.batches = this.batches.slice(at);
    for (const { roverId, epochs } of group) {
      this.waiting -= epochs.length;
      const left = (this.waitingOf.get(roverId) ?? 0) - epochs.length;
      if (left > 0) this.waitingOf.set(roverId, left);
      else this.waitingOf.delete(roverId);
    }
    return group;
  }

  private commitOnce(): void {
    const group = this.takeGroup();
    const stopTimer = this.metrics.commitSeconds.startTimer();
    let written: Written[];
    try {
      this.client.exec('BEGIN IMMEDIATE');
      this.writer.begin();
      written = group.map((batch) => this.writer.write(batch.roverId, batch.epochs, batch.sigmas));
      this.writer.settleLate();
      this.client.exec('COMMIT');
    } catch (error) {
      // SQLite may have rolled back by itself (disk full).
      if (this.client.inTransaction) this.client.exec('ROLLBACK');
      for (const batch of group) batch.reject(error);
      return;
    } finally {
      stopTimer();
      this.metrics.commitQueue.set(this.waiting);
    }
    const changes = this.writer.commit();
    for (const [index, batch] of group.entries()) batch.resolve(written[index]!);
    if (changes.length > 0) this.committed.next(changes);
  }
}
