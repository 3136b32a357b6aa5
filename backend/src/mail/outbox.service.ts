import { Inject, Injectable } from '@nestjs/common';
import { DAY_MS } from '@hubtack/contracts/nmea/sentence.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { outbox } from '@hubtack/drizzle/schema/outbox.js';
import { and, asc, count, eq, isNull, lte, ne } from 'drizzle-orm';
import { Clock } from '../common/clock.js';
import { DATABASE } from '../database/database.module.js';
import type { Mail } from './mails.js';

export interface OutboxMail extends Mail {
  /** Why it goes out, such as `notice 3 12 raised 10`. */
  reason: string;
  html?: string;
}
export type OutboxRow = typeof outbox.$inferSelect;

/** News of three days ago helps nobody. */
const KEPT_TRYING_MS = 3 * DAY_MS;
const isWaiting = and(isNull(outbox.sentAt), isNull(outbox.failedAt));

/** Mails on their way, as rows: whoever writes of something puts the mail about it into the same transaction. */
@Injectable()
export class OutboxService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly clock: Clock,
  ) {}

  /** Puts a mail in; does nothing when one for the same reason is there, sent or not. */
  put(tx: Pick<HubtackDatabase, 'insert'>, mail: OutboxMail): void {
    const now = this.clock.now();
    tx.insert(outbox)
      .values({ ...mail, createdAt: now, nextTryAt: now })
      .onConflictDoNothing({ target: outbox.reason })
      .run();
  }

  waiting(): number {
    return this.database.select({ mails: count() }).from(outbox).where(isWaiting).get()?.mails ?? 0;
  }

  /** The mail to be tried next, the least tried first so that one that fails again and again keeps no other back; undefined when none is due. */
  nextDue(): OutboxRow | undefined {
    return this.database
      .select()
      .from(outbox)
      .where(and(isWaiting, lte(outbox.nextTryAt, this.clock.now())))
      .orderBy(asc(outbox.tries), asc(outbox.nextTryAt), asc(outbox.id))
      .limit(1)
      .get();
  }

  markSent(id: number, sentAt: number): void {
    this.database.update(outbox).set({ sentAt, lastError: null }).where(eq(outbox.id, id)).run();
  }

  markFailed({ id, tries }: OutboxRow, lastError: string): void {
    const change = { failedAt: this.clock.now(), tries: tries + 1, lastError };
    this.database.update(outbox).set(change).where(eq(outbox.id, id)).run();
  }

  tryLater({ id, tries }: OutboxRow, delayMs: number, lastError: string): void {
    const change = { nextTryAt: this.clock.now() + delayMs, tries: tries + 1, lastError };
    this.database.update(outbox).set(change).where(eq(outbox.id, id)).run();
  }

  /** The mail server is away: whatever is due waits with the one that found out. */
  holdOthers(exceptId: number, delayMs: number): void {
    const now = this.clock.now();
    this.database
      .update(outbox)
      .set({ nextTryAt: now + delayMs })
      .where(and(isWaiting, lte(outbox.nextTryAt, now), ne(outbox.id, exceptId)))
      .run();
  }

  /** Answers how many were given up. */
  giveUpOld(): number {
    const now = this.clock.now();
    return this.database
      .update(outbox)
      .set({ failedAt: now, lastError: 'Not taken by the mail server for three days' })
      .where(and(isWaiting, lte(outbox.createdAt, now - KEPT_TRYING_MS)))
      .run().changes;
  }
}
