/** Gathers what comes in and hands it on together, at most once in `intervalMs`. */
export class Batcher<T> {
  private waiting: T[] = [];
  private timer: ReturnType<typeof setTimeout> | null = null;

  constructor(
    private readonly intervalMs: number,
    private readonly handOn: (batch: T[]) => void,
  ) {}

  push(item: T): void {
    this.waiting.push(item);
    this.timer ??= setTimeout(() => this.flush(), this.intervalMs);
  }

  flush(): void {
    if (this.timer !== null) clearTimeout(this.timer);
    this.timer = null;
    const batch = this.waiting;
    this.waiting = [];
    if (batch.length > 0) this.handOn(batch);
  }

  /** Lets go of what waits. */
  clear(): void {
    if (this.timer !== null) clearTimeout(this.timer);
    this.timer = null;
    this.waiting = [];
  }
}
