import { Inject, Injectable } from '@nestjs/common';
import { DAY_MS } from '@hubtack/contracts/nmea/sentence.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { roverAssignments } from '@hubtack/drizzle/schema/rovers.js';
import { and, asc, eq, gt, isNull, lt, or } from 'drizzle-orm';
import { clip, type Interval } from '../common/interval.js';
import { DATABASE } from '../database/database.module.js';
import { clipSpans } from '../fixes/timeline.js';
import { FixesService } from '../fixes/fixes.service.js';
import { HolidaysService } from '../settings/holidays.service.js';
import { clipShift, crewShiftsOf, type CrewShift } from './crew-shifts.js';
import { crewDayOf, type CrewDay, type ShiftMark } from './on-shift.js';
import { ShiftMarksRepository } from './shift-marks.repository.js';

/** A shift of a crew, cut to the time in which it had a rover. */
export interface RoverShift extends CrewShift {
  roverId: number;
  crewId: number;
}

@Injectable()
export class ShiftsService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly shiftMarks: ShiftMarksRepository,
    private readonly fixes: FixesService,
    private readonly holidays: HolidaysService,
  ) {}

  /** When a crew is on shift on a local day. */
  crewDay(crewId: number, day: Interval, zone: string): CrewDay {
    const crew = this.database
      .select({ pattern: crews.pattern })
      .from(crews)
      .where(eq(crews.id, crewId))
      .get();
    return crewDayOf(day, this.marks(crewId, day), crew?.pattern ?? [], zone, this.holidays.days());
  }

  /**
   * Shifts, each whole, of the crews that had a rover during the window, cut to the time they had it. One that is not finished reaches past
   * now.
   */
  roverShifts(roverId: number, window: Interval, zone: string): RoverShift[] {
    return this.assignments(roverId, window).flatMap(({ crewId, start, end, pattern }) => {
      const had = { start: Math.max(start, window.start), end: Math.min(end ?? window.end, window.end) };
      const days = { start: had.start - 2 * DAY_MS, end: had.end + 2 * DAY_MS };
      const heardOn = (day: Interval) =>
        this.heardOn(roverId, clip([day], { start, end: end ?? day.end })[0]);
      return crewShiftsOf(had, this.marks(crewId, days), pattern, zone, heardOn, this.holidays.days())
        .map((shift) => clipShift(shift, { start, end }))
        .filter((shift) => shift !== null)
        .map((shift) => ({ ...shift, roverId, crewId }));
    });
  }

  /** Rovers that a crew has had since an instant. */
  roversSince(crewId: number, from: number): number[] {
    const rows = this.database
      .selectDistinct({ roverId: roverAssignments.roverId })
      .from(roverAssignments)
      .where(
        and(
          eq(roverAssignments.crewId, crewId),
          or(isNull(roverAssignments.endAt), gt(roverAssignments.endAt, from)),
        ),
      )
      .all();
    return rows.map(({ roverId }) => roverId);
  }

  private heardOn(roverId: number, day: Interval | undefined): Interval | null {
    if (!day) return null;
    const heard = clipSpans(this.fixes.spans(roverId, day.start, day.end), day.start, day.end);
    return heard.length === 0 ? null : { start: heard[0]!.start, end: heard.at(-1)!.end };
  }

  private assignments(roverId: number, window: Interval) {
    return this.database
      .select({
        crewId: roverAssignments.crewId,
        start: roverAssignments.startAt,
        end: roverAssignments.endAt,
        pattern: crews.pattern,
      })
      .from(roverAssignments)
      .innerJoin(crews, eq(crews.id, roverAssignments.crewId))
      .where(
        and(
          eq(roverAssignments.roverId, roverId),
          lt(roverAssignments.startAt, window.end),
          or(isNull(roverAssignments.endAt), gt(roverAssignments.endAt, window.start)),
        ),
      )
      .orderBy(asc(roverAssignments.startAt))
      .all();
  }

  /** Shift marks of a crew that touch a stretch of time, with their pauses. */
  private marks(crewId: number, window: Interval): ShiftMark[] {
    return this.shiftMarks.list(crewId, window).map(({ start, end, pauses }) => ({
      start,
      end,
      // A pause ends with its shift.
      pauses: pauses.map((pause) => ({ start: pause.start, end: pause.end ?? end })),
    }));
  }
}
