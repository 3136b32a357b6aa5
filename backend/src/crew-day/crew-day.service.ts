import { Inject, Injectable } from '@nestjs/common';
import type { CrewDayView } from '@hubtack/contracts/shifts/shift.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { roverAssignments, rovers } from '@hubtack/drizzle/schema/rovers.js';
import { and, asc, eq, gt, isNull, lt, or } from 'drizzle-orm';
import { DateTime } from 'luxon';
import type { Viewer } from '../auth/access.js';
import { Clock } from '../common/clock.js';
import type { Interval } from '../common/interval.js';
import { localDayOf } from '../common/local-day.js';
import { notFound } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';
import { FixesService } from '../fixes/fixes.service.js';
import { clipSpans } from '../fixes/timeline.js';
import { LostFixRepository } from '../lost-fixes/lost-fix.repository.js';
import { lostFixOf } from '../lost-fixes/lost-fix.view.js';
import { SettingsService } from '../settings/settings.service.js';
import { dutyAt } from '../shifts/on-shift.js';
import { ShiftMarksRepository } from '../shifts/shift-marks.repository.js';
import { ShiftsService } from '../shifts/shifts.service.js';

/** One local day of a crew in one answer: shifts, ribbons, lost fixes. */
@Injectable()
export class CrewDayService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly settings: SettingsService,
    private readonly shifts: ShiftsService,
    private readonly marks: ShiftMarksRepository,
    private readonly fixes: FixesService,
    private readonly lostFixes: LostFixRepository,
    private readonly clock: Clock,
  ) {}

  /** `date`: local day, today when absent. A crew chief has the own crew only. */
  day(viewer: Viewer, crewId: number, date?: string): CrewDayView {
    this.check(viewer, crewId);
    const crew = this.database.select().from(crews).where(eq(crews.id, crewId)).get();
    if (!crew) throw notFound('This crew');
    const zone = this.settings.get().timeZone;
    const now = this.clock.now();
    const day = localDayOf(date ? DateTime.fromISO(date, { zone }).toMillis() : now, zone);
    const crewDay = this.shifts.crewDay(crewId, day, zone);
    return {
      crewId,
      crewName: crew.name,
      dayStart: day.start,
      dayEnd: day.end,
      basis: crewDay.basis,
      duty: dutyAt(crewDay, now),
      shifts: this.marks.list(crewId, day),
      onShift: crewDay.onShift,
      rovers: this.roversOn(crewId, day),
      lostFixes: this.lostFixes.ofCrew(crewId, day.start, day.end).map(lostFixOf),
    };
  }

  /** Any other crew does not exist for a crew chief. */
  check(viewer: Viewer, crewId: number): void {
    if (viewer.role === 'crewChief' && viewer.crewId !== crewId) throw notFound('This crew');
  }

  private roversOn(crewId: number, day: Interval): CrewDayView['rovers'] {
    return this.database
      .select({
        id: rovers.id,
        label: rovers.label,
        start: roverAssignments.startAt,
        end: roverAssignments.endAt,
      })
      .from(roverAssignments)
      .innerJoin(rovers, eq(rovers.id, roverAssignments.roverId))
      .where(
        and(
          eq(roverAssignments.crewId, crewId),
          lt(roverAssignments.startAt, day.end),
          or(isNull(roverAssignments.endAt), gt(roverAssignments.endAt, day.start)),
        ),
      )
      .orderBy(asc(rovers.label))
      .all()
      .map(({ id, label, start, end }) => {
        const from = Math.max(day.start, start);
        const to = Math.min(day.end, end ?? day.end);
        return { id, label, spans: clipSpans(this.fixes.spans(id, from, to), from, to) };
      });
  }
}
