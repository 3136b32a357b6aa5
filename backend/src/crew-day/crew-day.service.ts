import { Inject, Injectable } from '@nestjs/common';
import type { CrewDayView, SiteVisitList } from '@hubtack/contracts/shifts/shift.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { roverAssignments, rovers } from '@hubtack/drizzle/schema/rovers.js';
import { sites } from '@hubtack/drizzle/schema/sites.js';
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
import { siteVisits, type PlacedSite } from './site-visits.js';

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
    const day = this.dayOf(date, zone);
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

  /** In order of time; what lies off shift is not there once the day's positions off shift have been dropped. */
  visits(viewer: Viewer, crewId: number, date?: string): SiteVisitList {
    this.check(viewer, crewId);
    const day = this.dayOf(date, this.settings.get().timeZone);
    const placed = this.database
      .select({ name: sites.name, latitude: sites.latitude, longitude: sites.longitude })
      .from(sites)
      .all()
      .filter((site): site is PlacedSite => site.latitude !== null && site.longitude !== null);
    return this.assignedOn(crewId, day)
      .flatMap(({ id, label, from, to }) =>
        siteVisits(this.fixes.places(id, from, to), placed).map((visit) => ({ roverLabel: label, ...visit })),
      )
      .toSorted((a, b) => a.start - b.start);
  }

  private dayOf(date: string | undefined, zone: string): Interval {
    return localDayOf(date ? DateTime.fromISO(date, { zone }).toMillis() : this.clock.now(), zone);
  }

  /** Any other crew does not exist for a crew chief. */
  check(viewer: Viewer, crewId: number): void {
    if (viewer.role === 'crewChief' && viewer.crewId !== crewId) throw notFound('This crew');
  }

  private roversOn(crewId: number, day: Interval): CrewDayView['rovers'] {
    return this.assignedOn(crewId, day).map(({ id, label, from, to }) => ({
      id,
      label,
      spans: clipSpans(this.fixes.spans(id, from, to), from, to),
    }));
  }

  /** Rovers of the crew on a day, and the part of it that they were the crew's. */
  private assignedOn(
    crewId: number,
    day: Interval,
  ): { id: number; label: string; from: number; to: number }[] {
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
      .map(({ id, label, start, end }) => ({
        id,
        label,
        from: Math.max(day.start, start),
        to: Math.min(day.end, end ?? day.end),
      }));
  }
}
