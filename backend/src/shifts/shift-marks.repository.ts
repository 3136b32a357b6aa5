import { Inject, Injectable } from '@nestjs/common';
import type { Shift } from '@hubtack/contracts/shifts/shift.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { shiftPauses, shifts } from '@hubtack/drizzle/schema/shifts.js';
import { and, asc, eq, gt, inArray, isNull, lt, or } from 'drizzle-orm';
import type { Interval } from '../common/interval.js';
import { DATABASE } from '../database/database.module.js';
import type { StepShift } from './shift-steps.js';

/** Shift marks as they are stored. */
@Injectable()
export class ShiftMarksRepository {
  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {}

  /** Marks of a crew that touch the window, in order. */
  list(crewId: number, window: Interval): Shift[] {
    const rows = this.database
      .select()
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
    return this.withPauses(rows);
  }

  get(id: number): Shift | undefined {
    const row = this.database.select().from(shifts).where(eq(shifts.id, id)).get();
    return row && this.withPauses([row])[0];
  }

  /** The marked shift that an instant lies in. `now`: whether its end has come. */
  markedAt(crewId: number, at: number, now: number): StepShift | null {
    const row = this.database
      .select({ id: shifts.id, start: shifts.startAt, end: shifts.endAt, endedBy: shifts.endedBy })
      .from(shifts)
      .where(
        and(
          eq(shifts.crewId, crewId),
          lt(shifts.startAt, at + 1),
          or(isNull(shifts.endAt), gt(shifts.endAt, at)),
        ),
      )
      .get();
    if (!row) return null;
    const pauses = this.database
      .select({ id: shiftPauses.id, start: shiftPauses.startAt, end: shiftPauses.endAt })
      .from(shiftPauses)
      .where(eq(shiftPauses.shiftId, row.id))
      .orderBy(asc(shiftPauses.startAt))
      .all();
    const { id, start, end, endedBy } = row;
    return {
      id,
      start,
      end,
      isFinished: endedBy !== null && end !== null && end <= now,
      pauses,
    };
  }

  /** Start of the first shift marked after an instant. */
  nextStart(crewId: number, at: number): number | null {
    const next = this.database
      .select({ start: shifts.startAt })
      .from(shifts)
      .where(and(eq(shifts.crewId, crewId), gt(shifts.startAt, at)))
      .orderBy(asc(shifts.startAt))
      .get();
    return next?.start ?? null;
  }

  private withPauses(rows: (typeof shifts.$inferSelect)[]): Shift[] {
    const pauses = this.database
      .select()
      .from(shiftPauses)
      .where(
        inArray(
          shiftPauses.shiftId,
          rows.map(({ id }) => id),
        ),
      )
      .orderBy(asc(shiftPauses.startAt))
      .all();
    return rows.map(({ id, crewId, startAt, endAt, startedBy, endedBy }) => ({
      id,
      crewId,
      start: startAt,
      end: endAt,
      startedBy,
      endedBy,
      pauses: pauses
        .filter(({ shiftId }) => shiftId === id)
        .map((pause) => ({
          start: pause.startAt,
          end: pause.endAt,
          reason: pause.reason,
          by: pause.markedBy,
        })),
    }));
  }
}
