import {
  Injectable,
  Logger,
  type BeforeApplicationShutdown,
  type OnApplicationBootstrap,
} from '@nestjs/common';
import { Clock } from '../common/clock.js';
import { MetricsService } from '../metrics/metrics.service.js';
import { MailService } from './mail.service.js';
import { OutboxService, type OutboxRow } from './outbox.service.js';
import { failureOf, retryDelayMs } from './smtp-outcome.js';

const LOOK_MS = 1000;
/** A mail that is being handed over when the server stops gets this long to arrive. */
const STOP_WITHIN_MS = 5000;

/** Sends what is due in the outbox, one mail at a time. */
@Injectable()
export class OutboxWorker implements OnApplicationBootstrap, BeforeApplicationShutdown {
  private readonly logger = new Logger(OutboxWorker.name);
  /** Taken by the mail server, not written yet: a refused write must not send them again. */
  private readonly taken = new Map<number, number>();
  /** Attempts in a row at which there was no mail server to talk to. */
  private unreachable = 0;
  private running: Promise<void> | null = null;
  private isStopping = false;
  private hasWarned = false;
  private timer: NodeJS.Timeout | null = null;

  constructor(
    private readonly outbox: OutboxService,
    private readonly mail: MailService,
    private readonly clock: Clock,
    private readonly metrics: MetricsService,
  ) {}

  onApplicationBootstrap(): void {
    this.timer = setInterval(() => void this.run(), LOOK_MS);
  }

  async beforeApplicationShutdown(): Promise<void> {
    if (this.timer) clearInterval(this.timer);
    this.isStopping = true;
    let waited: NodeJS.Timeout | undefined;
    const longEnough = new Promise<void>((resolve) => {
      waited = setTimeout(resolve, STOP_WITHIN_MS);
    });
    await Promise.race([this.running, longEnough]);
    clearTimeout(waited);
  }

  /** Resolves when nothing is due any more. Never rejects: what could not be done is due again. */
  run(): Promise<void> {
    this.running ??= this.sendDue()
      .catch((error: unknown) => this.logger.warn({ err: error }, 'outbox stopped; the next second goes on'))
      .finally(() => {
        this.running = null;
      });
    return this.running;
  }

  private async sendDue(): Promise<void> {
    const givenUp = this.outbox.giveUpOld();
    if (givenUp > 0) this.logger.error({ mails: givenUp }, 'mails given up: not taken for three days');
    if (this.mail.isSet) await this.sendAll();
    const waiting = this.outbox.waiting();
    this.metrics.outboxWaiting.set(waiting);
    if (waiting > 0 && !this.mail.isSet && !this.hasWarned) {
      this.hasWarned = true;
      this.logger.warn('no SMTP_URL is set: mails wait in the outbox');
    }
  }

  private async sendAll(): Promise<void> {
    while (!this.isStopping) {
      const row = this.outbox.nextDue();
      if (!row || !(await this.attempt(row))) return;
    }
  }

  /** Answers whether it makes sense to go on with the next one. */
  private async attempt(row: OutboxRow): Promise<boolean> {
    if (!this.taken.has(row.id)) {
      const { to, subject, text, html } = row;
      try {
        await this.mail.deliver({
          to,
          subject,
          text,
          html: html ?? undefined,
          messageId: this.messageId(row),
        });
      } catch (error) {
        return this.notTaken(row, error);
      }
      this.unreachable = 0;
      this.taken.set(row.id, this.clock.now());
    }
    this.outbox.markSent(row.id, this.taken.get(row.id)!);
    this.taken.delete(row.id);
    return true;
  }

  private notTaken(row: OutboxRow, error: unknown): boolean {
    const words = error instanceof Error ? error.message : String(error);
    const failure = failureOf(error);
    this.logger.warn({ mail: row.id, failure, reason: words }, 'mail not taken');
    this.unreachable = failure === 'unreachable' ? this.unreachable + 1 : 0;
    if (failure === 'refused') {
      this.outbox.markFailed(row, words);
      return true;
    }
    const delayMs = retryDelayMs(Math.max(row.tries + 1, this.unreachable), Math.random());
    this.outbox.tryLater(row, delayMs, words);
    if (failure === 'unreachable') this.outbox.holdOthers(row.id, delayMs);
    return failure === 'later';
  }

  /** Derived from the row alone (RFC 5322, 3.6.4): after a crash between sending and writing so, it is the same mail to whoever gets it twice. */
  private messageId({ id, createdAt }: OutboxRow): string {
    return `<outbox.${id}.${createdAt}@${this.mail.domain}>`;
  }
}
