import {
  Inject,
  Injectable,
  Logger,
  type BeforeApplicationShutdown,
  type OnApplicationBootstrap,
} from '@nestjs/common';
import type { Notice } from '@hubtack/contracts/notices/notice.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { Subject, Subscription } from 'rxjs';
import { publicUrlOf } from '../auth/public-url.js';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import { DATABASE } from '../database/database.module.js';
import { OutboxService } from '../mail/outbox.service.js';
import { dueNotices, type DueNotice } from './notice-policy.js';
import { NoticeRulesService, type NoticePerson } from './notice-rules.service.js';
import { NoticeRepository, type NoticeLostFix } from './notice.repository.js';
import { noticeMail, noticeText } from './notice-words.js';

const LOOK_MS = 1000;

/** A notice that was just stored, and whose it is. */
export interface Told {
  userId: number;
  notice: Notice;
}
interface Pending {
  due: DueNotice;
  person: NoticePerson;
  lostFix: NoticeLostFix;
}

/** Tells people of lost fixes by their rules: once, whatever restarts in between. */
@Injectable()
export class NoticesService implements OnApplicationBootstrap, BeforeApplicationShutdown {
  private readonly logger = new Logger(NoticesService.name);
  private readonly tellings = new Subject<Told>();
  readonly told = this.tellings.asObservable();
  private readonly subscriptions = new Subscription();
  /** When something comes due with nothing else happening; null when nothing waits. */
  private nextAt: number | null = null;
  private timer: NodeJS.Timeout | null = null;
  private soon: NodeJS.Immediate | null = null;

  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    @Inject(ENVIRONMENT) private readonly environment: Environment,
    private readonly notices: NoticeRepository,
    private readonly rules: NoticeRulesService,
    private readonly outbox: OutboxService,
    private readonly changes: Changes,
    private readonly clock: Clock,
  ) {}

  onApplicationBootstrap(): void {
    this.subscriptions.add(
      this.changes.all.subscribe((change) => {
        if (change.kind === 'lostFix') this.runSoon();
      }),
    );
    this.subscriptions.add(this.rules.changed.subscribe(() => this.runSoon()));
    this.timer = setInterval(() => {
      if (this.nextAt !== null && this.clock.now() >= this.nextAt) this.run();
    }, LOOK_MS);
    this.run();
  }

  beforeApplicationShutdown(): void {
    this.subscriptions.unsubscribe();
    if (this.timer) clearInterval(this.timer);
    if (this.soon) clearImmediate(this.soon);
  }

  newest(userId: number): Notice[] {
    return this.notices.newest(userId);
  }

  markSeen(userId: number, upTo: number): void {
    this.notices.markSeen(userId, upTo, this.clock.now());
  }

  /** Tells whatever is due now. */
  run(): void {
    const now = this.clock.now();
    let told: Told[];
    try {
      const { pending, nextAt } = this.pending(now);
      told = pending.length === 0 ? [] : this.database.transaction((tx) => this.store(tx, pending, now));
      this.nextAt = nextAt;
    } catch (error) {
      this.logger.error({ err: error }, 'notices were not told; the next second tries again');
      this.nextAt = now;
      return;
    }
    for (const one of told) this.tellings.next(one);
  }

  /** Once for all that is announced in one turn. */
  private runSoon(): void {
    this.soon ??= setImmediate(() => {
      this.soon = null;
      this.run();
    });
  }

  private pending(now: number): { pending: Pending[]; nextAt: number | null } {
    const lostFixes = this.notices.lostFixes(now);
    if (lostFixes.length === 0) return { pending: [], nextAt: null };
    const byId = new Map(lostFixes.map((one) => [one.id, one]));
    const people = this.rules.people();
    const told = this.notices.told(
      people.map(({ userId }) => userId),
      [...byId.keys()],
    );
    let nextAt = Infinity;
    const pending = people.flatMap((person) => {
      const found = dueNotices(person, lostFixes, told.get(person.userId)!, now);
      nextAt = Math.min(nextAt, found.nextAt ?? Infinity);
      return found.notices.map((due) => ({ due, person, lostFix: byId.get(due.lostFixId)! }));
    });
    return { pending, nextAt: nextAt === Infinity ? null : nextAt };
  }

  private store(tx: Pick<HubtackDatabase, 'insert'>, pending: readonly Pending[], now: number): Told[] {
    return pending.flatMap(({ due, person, lostFix }) => {
      const { userId } = person;
      const { lostFixId, subject, occasion, dueKey, ways } = due;
      const advice = occasion.kind === 'advice' && lostFix.advice.find(({ id }) => id === occasion.adviceId);
      const text = noticeText(occasion, lostFix, advice ? advice.text : null, now);
      const row = this.notices.insert({ userId, lostFixId, subject, dueKey, at: now, text, ways });
      if (!row) return [];
      if (ways.includes('mail')) {
        const mail = noticeMail(
          person.email,
          text,
          lostFix,
          `${publicUrlOf(this.environment)}/lost-fixes/${lostFixId}`,
        );
        this.outbox.put(tx, { ...mail, reason: `notice ${userId} ${dueKey}` });
      }
      const { id, at, seenAt } = row;
      return [{ userId, notice: { id, at, subject, kind: lostFix.kind, lostFixId, text, ways, seenAt } }];
    });
  }
}
