import { Clock } from '@hubtack/backend/common/clock.js';

/** The server's clock, moved by the test: never waited for. */
export class MovingClock extends Clock {
  private offsetMs = 0;
  private frozenAt: number | null = null;

  override now(): number {
    return this.frozenAt ?? Date.now() + this.offsetMs;
  }

  /** Stands still at this instant from now on. */
  set(at: number): void {
    this.frozenAt = at;
  }

  /** Goes on with the machine's own time. */
  run(): void {
    this.frozenAt = null;
    this.offsetMs = 0;
  }

  advance(ms: number): void {
    if (this.frozenAt === null) this.offsetMs += ms;
    else this.frozenAt += ms;
  }
}
