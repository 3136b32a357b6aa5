import { drain, waitBeforeMs, type DrainEnd, type DrainParts } from './queue';

const LOCK = 'hubtack.taps';

/** Without locks (a page that is not served securely) each tab sends for itself; the keys still make it happen once. */
const oneTabAtATime = (work: () => Promise<DrainEnd>): Promise<DrainEnd> =>
  'locks' in navigator ? navigator.locks.request(LOCK, work) : work();

/** Decides when to send: at once, when the signal or the page comes back, and after a while when it did not work. */
export class TapRunner {
  private running = false;
  private isAskedAgain = false;
  private failures = 0;
  private timer: ReturnType<typeof setTimeout> | null = null;

  constructor(
    private readonly parts: DrainParts,
    private readonly onEnd: (end: DrainEnd) => void,
  ) {}

  start(): void {
    addEventListener('online', () => this.nudge());
    addEventListener('pageshow', () => this.nudge());
    document.addEventListener('visibilitychange', () => {
      if (document.visibilityState === 'visible') this.nudge();
    });
    this.nudge();
  }

  /** Sends now. While a sending is under way it looks again afterwards, so that a tap in between is not left lying. */
  readonly nudge = (): void => {
    if (this.timer !== null) clearTimeout(this.timer);
    this.timer = null;
    if (this.running) this.isAskedAgain = true;
    else void this.run();
  };

  private async run(): Promise<void> {
    this.running = true;
    do {
      this.isAskedAgain = false;
      const end = await oneTabAtATime(() => drain(this.parts)).catch((): DrainEnd => ({
        kind: 'later',
        waitMs: null,
        moved: false,
      }));
      this.plan(end);
      this.onEnd(end);
      // A try that has just failed is not made again at once, whoever asked meanwhile.
      if (end.kind === 'later') break;
    } while (this.isAskedAgain);
    this.running = false;
  }

  private plan(end: DrainEnd): void {
    if (end.kind !== 'later') {
      this.failures = 0;
      return;
    }
    const beganAnew = end.moved || this.isAskedAgain;
    this.failures = beganAnew ? 1 : this.failures + 1;
    this.timer = setTimeout(this.nudge, waitBeforeMs(this.failures, end.waitMs, Math.random()));
  }
}
