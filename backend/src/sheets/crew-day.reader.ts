import { Inject, Injectable } from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { rovers } from '@hubtack/drizzle/schema/rovers.js';
import { addTotals, noTotals } from '@hubtack/contracts/fixes/totals.js';
import { asc, eq, inArray } from 'drizzle-orm';
import { intersect, type Interval } from '../common/interval.js';
import { localDayOf } from '../common/local-day.js';
import { DATABASE } from '../database/database.module.js';
import { FixesService } from '../fixes/fixes.service.js';
import { partition, totalsOf } from '../fixes/timeline.js';
import { LostFixRepository } from '../lost-fixes/lost-fix.repository.js';
import { lostFixOf } from '../lost-fixes/lost-fix.view.js';
import { SettingsService } from '../settings/settings.service.js';
import { ShiftsService } from '../shifts/shifts.service.js';
import type { CrewDayFacts } from './daily-sheet.js';
import { dailyDue, type CrewShiftDay } from './sheet-times.js';

/** Lost fixes that wait to be closed: more than this is no list for a mail. */
const MOST_WAITING = 20;

/** Reads what a crew's daily sheet is made of. */
@Injectable()
export class CrewDayReader {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly settings: SettingsService,
    private readonly shifts: ShiftsService,
    private readonly fixes: FixesService,
    private readonly lostFixes: LostFixRepository,
  ) {}

  /** Days of which this crew's sheet is due now. */
  due(crewId: number, now: number): CrewShiftDay[] {
    const { timeZone } = this.settings.get();
    const today = localDayOf(now, timeZone);
    const yesterday = localDayOf(today.start - 1, timeZone);
    // Enough to see a night shift whole, and whether one of today goes on past midnight.
    const days = [
      localDayOf(yesterday.start - 1, timeZone),
      yesterday,
      today,
      localDayOf(today.end, timeZone),
    ];
    const parts = days.flatMap((day) => {
      const { onShift, pauses } = this.shifts.crewDay(crewId, day, timeZone);
      return [...onShift, ...pauses];
    });
    return dailyDue(parts, now, timeZone);
  }

  facts(crewId: number, { day, shifts }: CrewShiftDay, now: number): CrewDayFacts {
    const { firmName, timeZone } = this.settings.get();
    const crew = this.database.select({ name: crews.name }).from(crews).where(eq(crews.id, crewId)).get();
    const whole = { start: shifts[0]!.start, end: shifts.at(-1)!.end };
    const began = (at: number) => shifts.some(({ start, end }) => start <= at && at < end);
    const lostFixes = this.lostFixes
      .ofCrew(crewId, whole.start, whole.end)
      .filter(({ row }) => began(row.startAt) && row.ending !== 'withdrawn')
      .map(lostFixOf);
    const waiting = this.lostFixes
      .list({ status: 'active', crewId }, MOST_WAITING)
      .filter(({ row }) => row.startAt < whole.start)
      .map(lostFixOf);
    const inOrder = (a: { startAt: number }, b: { startAt: number }) => a.startAt - b.startAt;
    return {
      firmName,
      crewName: crew?.name ?? '',
      day,
      timeZone,
      shifts,
      rovers: this.roversOf(crewId, shifts, whole, now),
      lostFixes: lostFixes.toSorted(inOrder),
      waitingFromBefore: waiting.toSorted(inOrder),
    };
  }

  private roversOf(
    crewId: number,
    shifts: readonly Interval[],
    whole: Interval,
    now: number,
  ): CrewDayFacts['rovers'] {
    const { timeZone } = this.settings.get();
    const ids = this.shifts.roversSince(crewId, whole.start);
    return this.database
      .select({ id: rovers.id, label: rovers.label })
      .from(rovers)
      .where(inArray(rovers.id, ids))
      .orderBy(asc(rovers.label))
      .all()
      .flatMap(({ id, label }) => {
        const worked = this.shifts
          .roverShifts(id, whole, timeZone)
          .filter((shift) => shift.crewId === crewId)
          .flatMap(({ onShift }) => intersect(onShift, shifts));
        if (worked.length === 0) return [];
        const spans = this.fixes.spans(id, whole.start, whole.end);
        const totals = worked
          .map(({ start, end }) => totalsOf(partition(spans, start, end, now)))
          .reduce(addTotals, noTotals());
        return [{ label, totals }];
      });
  }
}
