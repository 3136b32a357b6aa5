import { Inject, Injectable, Logger } from '@nestjs/common';
import { Interval } from '@nestjs/schedule';
import { DAY_MS } from '@hubtack/contracts/nmea/sentence.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { epochs, SLOT_MS } from '@hubtack/drizzle/schema/epochs.js';
import { passwordLinks } from '@hubtack/drizzle/schema/password-links.js';
import { roverAssignments } from '@hubtack/drizzle/schema/rovers.js';
import { signInSessions } from '@hubtack/drizzle/schema/sign-in-sessions.js';
import { taps } from '@hubtack/drizzle/schema/taps.js';
import { and, asc, eq, gt, gte, inArray, isNotNull, isNull, lt, or, sql } from 'drizzle-orm';
import { Clock } from '../common/clock.js';
import { clip, subtract, type Interval as TimeInterval } from '../common/interval.js';
import { localDayOf } from '../common/local-day.js';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import { DATABASE } from '../database/database.module.js';
import { SettingsService } from '../settings/settings.service.js';
import { ShiftsService } from '../shifts/shifts.service.js';

const HOUR_MS = 3_600_000;
/** Slots dealt with in one statement, so that rovers never wait long behind the retention. */
const SLOTS_AT_ONCE = 20;
/** Ended sign-ins and links are kept this long for whoever looks into a theft. */
const ENDED_KEPT_MS = 30 * DAY_MS;
const TAPS_KEPT_MS = 30 * DAY_MS;
/** Days before yesterday are looked at again for this long, because stored sentences come late. */
const DAYS_LOOKED_BACK = 3;

/** Lets go of what need not be kept: old raw epochs, positions outside on-shift time, ended sign-ins. */
@Injectable()
export class RetentionService {
  private readonly logger = new Logger(RetentionService.name);

  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    @Inject(ENVIRONMENT) private readonly environment: Environment,
    private readonly settings: SettingsService,
    private readonly shifts: ShiftsService,
    private readonly clock: Clock,
  ) {}

  @Interval(HOUR_MS)
  async run(): Promise<void> {
    try {
      await this.dropOldEpochs();
      if (!this.settings.get().keepPositionsOffShift) await this.dropPositionsOffShift();
      this.dropEndedSignIns();
      this.dropOldTaps();
    } catch (error) {
      this.logger.error({ err: error }, 'retention stopped; the next hour goes on');
    }
  }

  /** Spans stay for good; only raw epochs go. */
  async dropOldEpochs(): Promise<void> {
    const lastSlot = Math.floor((this.clock.now() - this.environment.RAW_EPOCH_DAYS * DAY_MS) / SLOT_MS);
    for (;;) {
      const oldest = this.database
        .select({ slot: epochs.slot })
        .from(epochs)
        .orderBy(asc(epochs.slot))
        .limit(1)
        .get();
      if (!oldest || oldest.slot >= lastSlot) return;
      const until = Math.min(oldest.slot + SLOTS_AT_ONCE, lastSlot);
      this.database.delete(epochs).where(lt(epochs.slot, until)).run();
      await this.pause();
    }
  }

  /** Where a crew was outside paid time is nobody's business: days that are over lose those positions. */
  async dropPositionsOffShift(): Promise<void> {
    const { timeZone } = this.settings.get();
    let day = localDayOf(this.clock.now(), timeZone);
    for (let back = 0; back < DAYS_LOOKED_BACK; back++) {
      day = localDayOf(day.start - 1, timeZone);
      for (const { roverId, crewId, during } of this.assignmentsOn(day)) {
        const { basis, onShift } = this.shifts.crewDay(crewId, day, timeZone);
        // Without a shift set, whatever was heard counts as on shift.
        if (basis === 'noShiftSet') continue;
        for (const off of subtract([during], onShift)) await this.dropPositions(roverId, off);
      }
    }
  }

  private assignmentsOn(day: TimeInterval): { roverId: number; crewId: number; during: TimeInterval }[] {
    return this.database
      .select()
      .from(roverAssignments)
      .where(
        and(
          lt(roverAssignments.startAt, day.end),
          or(isNull(roverAssignments.endAt), gt(roverAssignments.endAt, day.start)),
        ),
      )
      .all()
      .flatMap(({ roverId, crewId, startAt, endAt }) =>
        clip([{ start: startAt, end: endAt ?? day.end }], day).map((during) => ({ roverId, crewId, during })),
      );
  }

  private async dropPositions(roverId: number, during: TimeInterval): Promise<void> {
    const last = Math.floor((during.end - 1) / SLOT_MS);
    for (let slot = Math.floor(during.start / SLOT_MS); slot <= last; slot += SLOTS_AT_ONCE) {
      const slots = Array.from(
        { length: Math.min(SLOTS_AT_ONCE, last - slot + 1) },
        (_, index) => slot + index,
      );
      this.database
        .update(epochs)
        .set({ latitude: null, longitude: null, altitudeM: null })
        .where(
          and(
            inArray(epochs.slot, slots),
            eq(epochs.roverId, roverId),
            gte(epochs.time, during.start),
            lt(epochs.time, during.end),
            isNotNull(epochs.latitude),
          ),
        )
        .run();
      await this.pause();
    }
  }

  /** A phone that has not sent again in this time will not. */
  private dropOldTaps(): void {
    this.database
      .delete(taps)
      .where(lt(taps.at, this.clock.now() - TAPS_KEPT_MS))
      .run();
  }

  private dropEndedSignIns(): void {
    const before = this.clock.now() - ENDED_KEPT_MS;
    this.database
      .delete(signInSessions)
      .where(lt(sql`coalesce(${signInSessions.endedAt}, ${signInSessions.expiresAt})`, before))
      .run();
    this.database.delete(passwordLinks).where(lt(passwordLinks.expiresAt, before)).run();
  }

  /** Lets waiting posts through between two statements. */
  private pause(): Promise<void> {
    return new Promise((resolve) => {
      setImmediate(resolve);
    });
  }
}
