import { Inject, Injectable } from '@nestjs/common';
import type { Shift, ShiftBody, ShiftStep, ShiftStepBody } from '@hubtack/contracts/shifts/shift.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { shiftPauses, shifts } from '@hubtack/drizzle/schema/shifts.js';
import { and, eq, gt, isNull, lt, ne, or } from 'drizzle-orm';
import { DateTime } from 'luxon';
import { AuditService } from '../audit/audit.service.js';
import type { Viewer } from '../auth/access.js';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import { localDayOf } from '../common/local-day.js';
import { conflict, notFound, ProblemException } from '../common/problem.exception.js';
import { tapTime } from '../common/tap-time.js';
import { DATABASE } from '../database/database.module.js';
import { HolidaysService } from '../settings/holidays.service.js';
import { SettingsService } from '../settings/settings.service.js';
import { crewShiftsOf } from './crew-shifts.js';
import { ShiftMarksRepository } from './shift-marks.repository.js';
import { stepOf, type StepEffect, type StepShift } from './shift-steps.js';

const FOREVER = Number.MAX_SAFE_INTEGER;

/** Shift marks: made by the chief or the dispatcher as the day goes, and set right afterwards by the office. */
@Injectable()
export class ShiftMarksService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly marks: ShiftMarksRepository,
    private readonly settings: SettingsService,
    private readonly holidays: HolidaysService,
    private readonly audit: AuditService,
    private readonly changes: Changes,
    private readonly clock: Clock,
  ) {}

  /** Start, pause, resume or finish. Throws 409 when that contradicts what is marked. */
  step(viewer: Viewer, crewId: number, step: ShiftStep, body: ShiftStepBody): void {
    const at = tapTime(body.at, this.clock.now());
    this.database.transaction(() => {
      const crew = this.crew(crewId);
      const zone = this.settings.get().timeZone;
      const current =
        this.marks.markedAt(crewId, at, this.clock.now()) ?? this.plannedAt(crewId, crew.pattern, at, zone);
      const clock = (instant: number) => DateTime.fromMillis(instant, { zone }).toFormat('HH:mm');
      const result = stepOf(step, at, body.reason, current, this.marks.nextStart(crewId, at), clock);
      if ('refusal' in result) throw conflict(result.refusal);
      this.write(viewer, crewId, result.effect);
    });
    this.announce(crewId, at, null);
  }

  add(viewer: Viewer, crewId: number, body: ShiftBody): Shift {
    this.crew(crewId);
    const id = this.database.transaction((tx) => {
      this.checkFree(crewId, body, null);
      const row = {
        crewId,
        startAt: Date.parse(body.start),
        endAt: body.end === null ? null : Date.parse(body.end),
        startedBy: viewer.name,
        endedBy: body.end === null ? null : viewer.name,
      };
      const added = tx.insert(shifts).values(row).returning().get().id;
      this.writePauses(viewer, added, body);
      this.audit.record(viewer, { action: 'shift.added', subject: this.crew(crewId).name, after: body });
      return added;
    });
    this.announce(crewId, Date.parse(body.start), body.end);
    return this.found(id);
  }

  change(viewer: Viewer, id: number, body: ShiftBody): Shift {
    const before = this.found(id);
    this.database.transaction((tx) => {
      this.checkFree(before.crewId, body, id);
      const startAt = Date.parse(body.start);
      const endAt = body.end === null ? null : Date.parse(body.end);
      const startedBy = startAt === before.start ? before.startedBy : viewer.name;
      const endedBy = endAt === before.end ? before.endedBy : viewer.name;
      tx.update(shifts).set({ startAt, endAt, startedBy, endedBy }).where(eq(shifts.id, id)).run();
      tx.delete(shiftPauses).where(eq(shiftPauses.shiftId, id)).run();
      this.writePauses(viewer, id, body, before.pauses);
      const subject = this.crew(before.crewId).name;
      this.audit.record(viewer, { action: 'shift.changed', subject, before, after: body });
    });
    const end = before.end === null || body.end === null ? null : Math.max(before.end, Date.parse(body.end));
    this.announce(before.crewId, Math.min(before.start, Date.parse(body.start)), end);
    return this.found(id);
  }

  remove(viewer: Viewer, id: number): void {
    const before = this.found(id);
    this.database.transaction((tx) => {
      tx.delete(shifts).where(eq(shifts.id, id)).run();
      const subject = this.crew(before.crewId).name;
      this.audit.record(viewer, { action: 'shift.removed', subject, before });
    });
    this.announce(before.crewId, before.start, before.end);
  }

  private found(id: number): Shift {
    const shift = this.marks.get(id);
    if (!shift) throw notFound('This shift');
    return shift;
  }

  private crew(id: number) {
    const crew = this.database.select().from(crews).where(eq(crews.id, id)).get();
    if (!crew) throw notFound('This crew');
    return crew;
  }

  private plannedAt(
    crewId: number,
    pattern: Parameters<typeof crewShiftsOf>[2],
    at: number,
    zone: string,
  ): StepShift | null {
    const day = localDayOf(at, zone);
    const marks = this.marks.list(crewId, { start: day.start - 86_400_000, end: day.end + 86_400_000 });
    const planned = crewShiftsOf(
      { start: at, end: at + 1 },
      marks,
      pattern,
      zone,
      () => null,
      this.holidays.days(),
    ).find(({ basis }) => basis === 'pattern');
    return planned
      ? { id: null, start: planned.start, end: planned.end, isFinished: false, pauses: [] }
      : null;
  }

  private write(viewer: Viewer, crewId: number, effect: StepEffect): void {
    const by = viewer.name;
    switch (effect.do) {
      case 'start':
        this.insert({ crewId, startAt: effect.at, endAt: null, startedBy: by });
        break;
      case 'pause':
        this.database
          .insert(shiftPauses)
          .values({
            shiftId: this.marked(crewId, effect.shift),
            startAt: effect.at,
            reason: effect.reason,
            markedBy: by,
          })
          .run();
        break;
      case 'resume':
        this.database
          .update(shiftPauses)
          .set({ endAt: effect.at })
          .where(eq(shiftPauses.id, effect.pauseId))
          .run();
        break;
      case 'finish':
        this.database
          .update(shifts)
          .set({ endAt: effect.at, endedBy: by })
          .where(eq(shifts.id, this.marked(crewId, effect.shift)))
          .run();
        if (effect.openPauseId !== null)
          this.database
            .update(shiftPauses)
            .set({ endAt: effect.at })
            .where(eq(shiftPauses.id, effect.openPauseId))
            .run();
    }
  }

  /** A planned shift becomes marks, beginning and end as planned, at the first step that is taken in it. */
  private marked(crewId: number, { id, start, end }: StepShift): number {
    return id ?? this.insert({ crewId, startAt: start, endAt: end });
  }

  private insert(values: typeof shifts.$inferInsert): number {
    return this.database.insert(shifts).values(values).returning({ id: shifts.id }).get().id;
  }

  private writePauses(
    viewer: Viewer,
    shiftId: number,
    { pauses }: ShiftBody,
    before: Shift['pauses'] = [],
  ): void {
    for (const { start, end, reason } of pauses) {
      const startAt = Date.parse(start);
      const endAt = end === null ? null : Date.parse(end);
      const untouched = before.find(
        (pause) => pause.start === startAt && pause.end === endAt && pause.reason === reason,
      );
      this.database
        .insert(shiftPauses)
        .values({
          shiftId,
          startAt,
          endAt,
          reason,
          markedBy: untouched ? untouched.by : viewer.name,
        })
        .run();
    }
  }

  private checkFree(crewId: number, body: ShiftBody, ownId: number | null): void {
    const start = Date.parse(body.start);
    const end = body.end === null ? FOREVER : Date.parse(body.end);
    const refuse = (pointer: string, detail: string) => {
      throw new ProblemException(400, 'invalidBody', detail, { errors: [{ pointer, detail }] });
    };
    if (start > this.clock.now())
      refuse('/start', 'A shift to come is planned in the crew’s pattern, not marked.');
    const other = this.database
      .select({ id: shifts.id })
      .from(shifts)
      .where(
        and(
          eq(shifts.crewId, crewId),
          lt(shifts.startAt, end),
          or(isNull(shifts.endAt), gt(shifts.endAt, start)),
          ...(ownId === null ? [] : [ne(shifts.id, ownId)]),
        ),
      )
      .get();
    if (other) refuse('/start', 'It overlaps another shift of this crew.');
    const overlap = body.pauses
      .toSorted((a, b) => Date.parse(a.start) - Date.parse(b.start))
      .some((pause, index, list) => {
        const before = list[index - 1];
        return before && (before.end === null || Date.parse(before.end) > Date.parse(pause.start));
      });
    if (overlap) refuse('/pauses', 'Pauses overlap.');
  }

  /** `to`: where what changed ends; null: now. */
  private announce(crewId: number, from: number, to: number | string | null): void {
    // A day's first mark takes the whole of its pattern away, its last one gone brings it back.
    const zone = this.settings.get().timeZone;
    const last = typeof to === 'string' ? Date.parse(to) : (to ?? this.clock.now());
    const { start } = localDayOf(from, zone);
    const { end } = localDayOf(last, zone);
    this.changes.announce({ kind: 'marks', crewId, from: start, to: end });
    this.changes.announce({ kind: 'firm' });
  }
}
