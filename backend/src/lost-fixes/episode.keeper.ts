import { Injectable } from '@nestjs/common';
import type { Limits } from '@hubtack/contracts/lost-fixes/limits.js';
import { localDayOf } from '../common/local-day.js';
import { FixesService } from '../fixes/fixes.service.js';
import { clipSpans } from '../fixes/timeline.js';
import { ShiftsService, type RoverShift } from '../shifts/shifts.service.js';
import { isChattering } from './chattering.js';
import { detectorLimitsOf, episodesOf, type DetectorLimits, type Episode } from './detector.js';
import { DiagnosisService } from './diagnosis.service.js';
import { flagEnd } from './flag-end.js';
import { LostFixRepository } from './lost-fix.repository.js';
import { saysLooksWrong, type LostFixRow } from './lost-fix.view.js';
import { LostFixWriter } from './lost-fix.writer.js';
import { OutageKeeper } from './outage.keeper.js';
import { reconcile } from './reconcile.js';
import { isWorking, type WatchedRover } from './watched-rover.js';

/** Shifts are read this far on either side of now, so that they need not be read at every look. */
const SHIFTS_AROUND_MS = 3_600_000;
const CHATTERING_LOOKS_BACK_MS = 30 * 60_000;
const UNENDED = Number.MAX_SAFE_INTEGER;

export interface Look {
  now: number;
  zone: string;
  limits: Limits;
}

/** Keeps the stored lost fixes of one rover equal to the episodes of its timeline. */
@Injectable()
export class EpisodeKeeper {
  constructor(
    private readonly fixes: FixesService,
    private readonly shifts: ShiftsService,
    private readonly lostFixes: LostFixRepository,
    private readonly writer: LostFixWriter,
    private readonly diagnosis: DiagnosisService,
    private readonly outages: OutageKeeper,
  ) {}

  /** Shifts that overlap [from, now], from memory when they are there. */
  shiftsOf(rover: WatchedRover, from: number, look: Look): RoverShift[] {
    const { shiftsWindow } = rover;
    const isKnown = rover.shifts !== null && from >= shiftsWindow.start && look.now < shiftsWindow.end;
    if (!isKnown) this.readShifts(rover, from, look);
    const unset = this.unsetShift(rover, look.now);
    const shifts = unset ? [...rover.shifts!, unset] : rover.shifts!;
    return shifts.filter(({ start, end }) => start <= look.now && (end ?? UNENDED) >= from);
  }

  private readShifts(rover: WatchedRover, from: number, { now, zone }: Look): void {
    const { roverId, crewId, assignedAt } = rover.entry;
    const day = localDayOf(now, zone);
    const window = { start: from - SHIFTS_AROUND_MS, end: Math.min(now + SHIFTS_AROUND_MS, day.end) };
    const isUnset = crewId !== null && this.shifts.crewDay(crewId, day, zone).basis === 'noShiftSet';
    rover.unsetToday = isUnset ? { start: Math.max(day.start, assignedAt ?? day.start), end: day.end } : null;
    rover.shiftsWindow = window;
    rover.shifts = this.shifts
      .roverShifts(roverId, window, zone)
      .filter(({ basis, start }) => basis !== 'noShiftSet' || start < day.start);
  }

  /** Today's shift where none is set: each sentence makes it longer, so it is not kept. */
  private unsetShift({ entry, unsetToday }: WatchedRover, now: number): RoverShift | null {
    if (unsetToday === null || entry.crewId === null) return null;
    const spans = this.fixes.spans(entry.roverId, unsetToday.start, now);
    const heard = clipSpans(spans, unsetToday.start, unsetToday.end);
    if (heard.length === 0) return null;
    const shift = { start: heard[0]!.start, end: heard.at(-1)!.end };
    const { roverId, crewId } = entry;
    return { basis: 'noShiftSet', ...shift, onShift: [shift], pauses: [], roverId, crewId };
  }

  /** Everything from `rover.lookedAt` on is worked out again, and what is stored follows. */
  look(rover: WatchedRover, look: Look): void {
    const { roverId } = rover.entry;
    const { now } = look;
    const open = rover.hasOpen ? this.lostFixes.ofRover(roverId, now, now) : [];
    const asked = Math.min(rover.lookedAt, ...open.map(({ startAt }) => startAt));
    const shifts = this.shiftsOf(rover, asked, look);
    const from = Math.min(asked, ...shifts.map(({ start }) => start));
    const limits = detectorLimitsOf(look.limits);
    const found = shifts.flatMap((shift) => this.episodesIn(shift, now, limits));
    const rows = this.lostFixes.ofRover(roverId, from, UNENDED);
    if (rows.length > 0 || found.length > 0) {
      this.apply(rover, found, rows, look);
      for (const row of rows) if (row.kind === 'flag') this.endFlag(row, shifts, look);
      rover.hasOpen = this.lostFixes.ofRover(roverId, now, now).length > 0;
    } else rover.hasOpen = false;
    rover.lookedAt = now;
    rover.isStale = false;
  }

  private episodesIn(shift: RoverShift, now: number, limits: DetectorLimits) {
    const until = Math.min(shift.end ?? now, now);
    const spans = this.fixes.spans(shift.roverId, shift.start, until);
    return episodesOf(spans, shift, now, limits).map((episode) => ({ episode, shift }));
  }

  private apply(
    rover: WatchedRover,
    found: readonly { episode: Episode; shift: RoverShift }[],
    rows: readonly LostFixRow[],
    look: Look,
  ): void {
    // A fix that looks wrong is no loss of it, and does not become one.
    const ofTimeline = rows.filter((row) => !saysLooksWrong(row));
    const stored = ofTimeline.map(({ id, kind, startAt, endAt, ending }) => ({
      id,
      kind: kind === 'mountPoint' ? ('lostFix' as const) : kind,
      start: startAt,
      end: endAt,
      isWithdrawn: ending === 'withdrawn',
    }));
    const shifts = new Map(found.map(({ episode, shift }) => [episode, shift]));
    const shiftOf = (episode: Episode) => shifts.get(episode)!;
    const byId = new Map(rows.map((row) => [row.id, row]));
    const result = reconcile(
      stored,
      found.map(({ episode }) => episode),
    );
    const isPaused = !isWorking(rover, look.now, this.fixes.heldUntil(rover.entry.roverId));
    for (const { id, episode } of result.keep) {
      const row = byId.get(id)!;
      const hasChanged = this.writer.follow(row, episode, isPaused);
      if (hasChanged || this.diagnosis.isDue(row, look.now))
        this.diagnosis.renew(rover, { ...row, ...this.lostFixes.row(id)! }, episode, shiftOf(episode), look);
    }
    for (const id of result.withdraw) this.writer.withdraw(byId.get(id)!);
    for (const episode of result.insert) this.raise(rover, episode, shiftOf(episode), look);
  }

  private raise(rover: WatchedRover, episode: Episode, shift: RoverShift, look: Look): void {
    const { roverId, mountPoint } = rover.entry;
    const sharedId = this.outages.sharedIdFor(rover, episode.start);
    const diagnosis = this.diagnosis.of(rover, episode, shift, look);
    const { kind, start: startAt, raisedAt, end: endAt, ending, pausedMs } = episode;
    this.writer.raise({
      kind,
      roverId,
      crewId: shift.crewId,
      mountPoint,
      startAt,
      raisedAt,
      endAt,
      ending,
      pausedMs,
      sharedId,
      diagnosis,
      diagnosisAtRaising: diagnosis,
      isChattering: this.chatters(roverId, raisedAt),
    });
  }

  private chatters(roverId: number, raisedAt: number): boolean {
    const earlier = this.lostFixes
      .ofRover(roverId, raisedAt - CHATTERING_LOOKS_BACK_MS, raisedAt + 1)
      .filter(({ ending, kind }) => ending !== 'withdrawn' && kind !== 'flag')
      .map((row) => row.raisedAt);
    return isChattering(
      [...earlier, raisedAt].toSorted((a, b) => a - b),
      raisedAt,
    );
  }

  /** A chief's flag that no loss came of is over when the fix has held since; one that says the fix looks wrong, only by a person. */
  private endFlag(row: LostFixRow, shifts: readonly RoverShift[], { now, limits }: Look): void {
    if (row.endAt !== null || row.closedAt !== null || saysLooksWrong(row)) return;
    const current = this.lostFixes.row(row.id)!;
    if (current.kind !== 'flag' || row.roverId === null) return;
    const shift = shifts.findLast(({ start }) => start <= row.startAt);
    const spans = this.fixes.spans(row.roverId, row.startAt, now);
    const end = flagEnd(row.startAt, spans, shift?.end ?? null, now, limits.regainedAfterSeconds * 1000);
    if (end) this.writer.end(row.id, end.at, end.ending);
  }
}
