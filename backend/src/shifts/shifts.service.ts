import { Inject, Injectable } from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { shiftPauses, shifts } from '@hubtack/drizzle/schema/shifts.js';
import { and, asc, eq, gt, inArray, isNull, lt, or } from 'drizzle-orm';
import type { Interval } from '../common/interval.js';
import { DATABASE } from '../database/database.module.js';
import { crewDayOf, type CrewDay, type ShiftMark } from './on-shift.js';

@Injectable()
export class ShiftsService {
  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {}

  /** When a crew is on shift on a local day. */
  crewDay(crewId: number, day: Interval, zone: string): CrewDay {
    const crew = this.database
      .select({ pattern: crews.pattern })
      .from(crews)
      .where(eq(crews.id, crewId))
      .get();
    return crewDayOf(day, this.marks(crewId, day), crew?.pattern ?? [], zone);
  }

  /** Shift marks of a crew that touch a stretch of time, with their pauses. */
  private marks(crewId: number, window: Interval): ShiftMark[] {
    const rows = this.database
      .select({ id: shifts.id, start: shifts.startAt, end: shifts.endAt })
      .from(shifts)
      .where(
        and(
          eq(shifts.crewId, crewId),
          lt(shifts.startAt, window.end),
          or(isNull(shifts.endAt), gt(shifts.endAt, window.start)),
        ),
      )
      .orderBy(asc(shifts.startAt))
      .all();
    const pauses = this.database
      .select({ shiftId: shiftPauses.shiftId, start: shiftPauses.startAt, end: shiftPauses.endAt })
      .from(shiftPauses)
      .where(
        inArray(
          shiftPauses.shiftId,
          rows.map(({ id }) => id),
        ),
      )
      .orderBy(asc(shiftPauses.startAt))
      .all();
    return rows.map(({ id, start, end }) => ({
      start,
      end,
      // A pause ends with its shift.
      pauses: pauses
        .filter(({ shiftId }) => shiftId === id)
        .map((pause) => ({ start: pause.start, end: pause.end ?? end })),
    }));
  }
}
