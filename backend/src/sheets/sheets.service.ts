import {
  Inject,
  Injectable,
  Logger,
  type BeforeApplicationShutdown,
  type OnApplicationBootstrap,
} from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { publicUrlOf } from '../auth/public-url.js';
import { Clock } from '../common/clock.js';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import { DATABASE } from '../database/database.module.js';
import { FiguresToDo } from '../fixes/figures-to-do.repository.js';
import { OutboxService } from '../mail/outbox.service.js';
import { SettingsService } from '../settings/settings.service.js';
import { WeeklyService } from '../weekly/weekly.service.js';
import { CrewDayReader } from './crew-day.reader.js';
import { dailyMail } from './daily-sheet.js';
import { weeklyDue } from './sheet-times.js';
import type { SheetMail } from './sheet.js';
import { SubscriptionRepository } from './subscription.repository.js';
import { weeklyMail } from './weekly-mail.js';

const MINUTE_MS = 60_000;
/** The clock is looked at this often for whether another minute has begun. */
const LOOK_MS = 1000;
/** The weekly sheet waits so long for figures that are being worked out again: what is sent cannot be put right. */
const PATIENCE_MS = 10 * MINUTE_MS;

/** Puts sheets into the outbox when they are due. Whether one has gone is told by the outbox alone, so restarts change nothing. */
@Injectable()
export class SheetsService implements OnApplicationBootstrap, BeforeApplicationShutdown {
  private readonly logger = new Logger(SheetsService.name);
  private minute = 0;
  private waitingSince: number | null = null;
  private timer: NodeJS.Timeout | null = null;

  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    @Inject(ENVIRONMENT) private readonly environment: Environment,
    private readonly subscriptions: SubscriptionRepository,
    private readonly settings: SettingsService,
    private readonly weeks: WeeklyService,
    private readonly crewDays: CrewDayReader,
    private readonly figuresToDo: FiguresToDo,
    private readonly outbox: OutboxService,
    private readonly clock: Clock,
  ) {}

  onApplicationBootstrap(): void {
    this.minute = this.minuteNow();
    this.timer = setInterval(() => {
      const minute = this.minuteNow();
      if (minute === this.minute) return;
      this.minute = minute;
      this.look();
    }, LOOK_MS);
  }

  beforeApplicationShutdown(): void {
    if (this.timer) clearInterval(this.timer);
  }

  /** Puts in whatever is due now and has not been put in before. Never throws: what could not be done is due again. */
  look(): void {
    const now = this.clock.now();
    this.guarded('weekly', () => this.lookAtWeek(now));
    this.guarded('daily', () => this.lookAtDays(now));
  }

  private minuteNow(): number {
    return Math.floor(this.clock.now() / MINUTE_MS);
  }

  private lookAtWeek(now: number): void {
    const { weeklyMailHour, timeZone } = this.settings.get();
    const week = weeklyDue(now, weeklyMailHour, timeZone);
    if (week === null) return;
    const waiting = this.subscriptions
      .subscribers('weekly')
      .map((person) => ({ ...person, reason: `weekly ${week} user ${person.userId}` }))
      .filter(({ reason }) => !this.subscriptions.isPut(reason));
    if (waiting.length === 0 || !this.areFiguresDone(now)) return;
    const mails = new Map<boolean, SheetMail>();
    for (const { reason, email, role } of waiting)
      this.guarded(reason, () => {
        const withMoney = role === 'manager';
        const mail = mails.get(withMoney) ?? this.weekMail(week, withMoney);
        mails.set(withMoney, mail);
        this.put(reason, email, mail);
      });
  }

  private weekMail(week: string, withMoney: boolean): SheetMail {
    const boardUrl = publicUrlOf(this.environment);
    return weeklyMail(this.weeks.week(week, withMoney), { boardUrl, withMoney });
  }

  private areFiguresDone(now: number): boolean {
    const isDone = this.figuresToDo.some(1).length === 0;
    this.waitingSince ??= now;
    if (!isDone && now - this.waitingSince < PATIENCE_MS) return false;
    this.waitingSince = null;
    return true;
  }

  private lookAtDays(now: number): void {
    for (const { userId, email, crewId } of this.subscriptions.subscribers('daily')) {
      if (crewId === null) continue;
      this.guarded(`daily user ${userId}`, () => {
        for (const crewDay of this.crewDays.due(crewId, now)) {
          const reason = `daily ${crewDay.day} crew ${crewId} user ${userId}`;
          if (this.subscriptions.isPut(reason)) continue;
          const facts = this.crewDays.facts(crewId, crewDay, now);
          this.put(reason, email, dailyMail(facts, publicUrlOf(this.environment)));
        }
      });
    }
  }

  private put(reason: string, to: string, mail: SheetMail): void {
    this.database.transaction((tx) => this.outbox.put(tx, { ...mail, reason, to }));
  }

  /** One sheet that cannot be made keeps no other back. */
  private guarded(what: string, make: () => void): void {
    try {
      make();
    } catch (error) {
      this.logger.error({ err: error, sheet: what }, 'sheet not made; the next minute tries again');
    }
  }
}
