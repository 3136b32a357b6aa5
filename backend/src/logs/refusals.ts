import type { RejectReason } from '@hubtack/contracts/ingest/ingest.js';
import { refusalOf, type TimeLimits } from '../ingest/time-limits.js';
import type { RefusedEpochs } from './log-messages.js';

/** Epochs of a log that may not enter a rover's history, by the limits of the ingest. */
export class Refusals {
  private readonly counts = new Map<RejectReason, number>();

  /** Without limits nothing is to enter it. */
  constructor(private readonly limits: TimeLimits | null) {}

  allows(time: number): boolean {
    if (!this.limits) return false;
    const refusal = refusalOf(time, this.limits);
    if (!refusal) return true;
    this.counts.set(refusal.code, (this.counts.get(refusal.code) ?? 0) + 1);
    return false;
  }

  inWords(): RefusedEpochs {
    const [tooOld, inFuture] = [this.counts.get('tooOld') ?? 0, this.counts.get('inFuture') ?? 0];
    const reasons: string[] = [];
    if (tooOld > 0)
      reasons.push(
        `${epochs(tooOld)} older than the ${this.limits!.rawEpochDays} days that raw epochs are kept: what went before cannot be worked out again.`,
      );
    if (inFuture > 0)
      reasons.push(`${epochs(inFuture)} more than 5 min ahead of the server. Is the date right?`);
    return { refused: tooOld + inFuture, reasons };
  }
}

const epochs = (count: number): string => (count === 1 ? '1 epoch is' : `${count} epochs are`);
