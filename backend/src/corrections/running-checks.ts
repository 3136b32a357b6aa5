import { Injectable } from '@nestjs/common';
import { conflict, ProblemException } from '../common/problem.exception.js';

export interface RunningWork {
  /** Who began it, for whoever comes second. */
  by: string;
  cancel: AbortController;
}

/** A check is a visitor on somebody else's machine: one at a time for each source, and few at once. */
const MOST_AT_ONCE = 4;

/** What asks a caster something just now, by source. */
@Injectable()
export class RunningChecks {
  private readonly bySource = new Map<number, RunningWork>();

  /** Throws 409 when somebody asks this source already, 429 when too many are under way. */
  begin(sourceId: number, by: string): RunningWork {
    const known = this.bySource.get(sourceId);
    if (known) throw conflict(`${known.by} is asking this source just now. One at a time.`);
    if (this.bySource.size >= MOST_AT_ONCE)
      throw new ProblemException(
        429,
        'tooManyRequests',
        'Several checks are under way. Wait for one to end.',
        {
          retryAfterSeconds: 10,
        },
      );
    const work = { by, cancel: new AbortController() };
    this.bySource.set(sourceId, work);
    return work;
  }

  end(sourceId: number): void {
    this.bySource.delete(sourceId);
  }

  isBusy(sourceId: number): boolean {
    return this.bySource.has(sourceId);
  }

  cancel(sourceId: number): void {
    this.bySource.get(sourceId)?.cancel.abort(new Error('cancelled'));
  }

  cancelAll(): void {
    for (const sourceId of this.bySource.keys()) this.cancel(sourceId);
  }
}
