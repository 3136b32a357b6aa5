import { Inject, Injectable } from '@nestjs/common';
import type { ConfirmedCause } from '@hubtack/contracts/lost-fixes/cause.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { lostFixes } from '@hubtack/drizzle/schema/lost-fixes.js';
import { and, gte, inArray, isNotNull, isNull, lt, ne, or } from 'drizzle-orm';
import type { Interval } from '../common/interval.js';
import { DATABASE } from '../database/database.module.js';

/** One lost fix as lost time. */
export interface LostTime {
  roverId: number;
  mountPoint: string | null;
  cause: ConfirmedCause;
  isConfirmed: boolean;
  /** Pauses taken off. */
  lostMs: number;
}

@Injectable()
export class LostTimeRepository {
  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {}

  /** Lost fixes of rovers that start in the interval; one that is open has lasted until now. */
  between(interval: Interval, now: number): LostTime[] {
    return this.database
      .select()
      .from(lostFixes)
      .where(
        and(
          gte(lostFixes.startAt, interval.start),
          lt(lostFixes.startAt, interval.end),
          inArray(lostFixes.kind, ['lostFix', 'noFirstFix', 'notHeard']),
          isNotNull(lostFixes.roverId),
          or(isNull(lostFixes.ending), ne(lostFixes.ending, 'withdrawn')),
        ),
      )
      .all()
      .map(({ roverId, mountPoint, confirmedCause, diagnosis, startAt, endAt, pausedMs }) => ({
        roverId: roverId!,
        mountPoint,
        cause: confirmedCause ?? diagnosis?.cause ?? 'unclear',
        isConfirmed: confirmedCause !== null,
        lostMs: Math.max(0, (endAt ?? now) - startAt - pausedMs),
      }));
  }
}
