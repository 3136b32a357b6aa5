import {
  Inject,
  Injectable,
  Logger,
  type BeforeApplicationShutdown,
  type OnApplicationBootstrap,
} from '@nestjs/common';
import type { Settings } from '@hubtack/contracts/settings/settings.js';
import { DAY_MS } from '@hubtack/contracts/nmea/sentence.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { DateTime } from 'luxon';
import { Subject } from 'rxjs';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import type { Interval } from '../common/interval.js';
import { isoDateOf, isoWeekOf, localDayOf } from '../common/local-day.js';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import { DATABASE } from '../database/database.module.js';
import { FiguresToDo, type ToDo } from '../fixes/figures-to-do.repository.js';
import { FixesService } from '../fixes/fixes.service.js';
import { HOLD_MS } from '../fixes/timeline.js';
import { STORED_MS } from '../fixes/timeline.writer.js';
import { detectorLimitsOf } from '../lost-fixes/detector.js';
import { RosterRepository } from '../rovers/roster.repository.js';
import { SettingsService } from '../settings/settings.service.js';
import { ShiftsService, type RoverShift } from '../shifts/shifts.service.js';
import { partFigures } from './part-figures.js';
import { ShiftFiguresRepository, type ShiftFigureRow } from './shift-figures.repository.js';
import { CrewProfiles } from './crew-profiles.js';
import { judgedParts, withinSpans } from './tolerance.js';

const TICK_MS = 1000;
/** Time that one tick may take from the thread that answers rovers. */
const BUDGET_MS = 40;
/** Figures of today are at most this old. */
const FRESH_MS = 30_000;
/** After a start, a rover that has no figures yet is worked out from this long ago; one that has, from its last day. */
const LOOKED_BACK_MS = 2 * DAY_MS;
const LONGEST_BACK_MS = 60 * DAY_MS;
/** A longer stretch is worked out in pieces, so that no tick takes long. */
const PIECE_MS = 3 * DAY_MS;

/** Stretches of a rover that lie close together, worked out as one. */
interface Work extends ToDo {
  parts: ToDo[];
}

const CLOSE_MS = DAY_MS;

function together(list: readonly ToDo[]): Work[] {
  const works: Work[] = [];
  for (const one of list.toSorted((a, b) => a.roverId - b.roverId || a.start - b.start)) {
    const last = works.at(-1);
    const joins =
      last?.roverId === one.roverId && one.start - last.end < CLOSE_MS && one.end - last.start <= PIECE_MS;
    if (joins) {
      last.end = Math.max(last.end, one.end);
      last.parts.push(one);
    } else works.push({ ...one, parts: [one] });
  }
  return works;
}

/** Keeps the figures of every rover-shift: of the past when it changes, within seconds; of today every half minute. */
@Injectable()
export class FiguresKeeper implements OnApplicationBootstrap, BeforeApplicationShutdown {
  private readonly logger = new Logger(FiguresKeeper.name);
  private readonly touchedWeeks = new Subject<string>();
  /** A week's rows have changed. */
  readonly touched = this.touchedWeeks.asObservable();
  /** When each rover's today was last worked out, and from where on its epochs are new. */
  private readonly live = new Map<number, { at: number; from: number }>();
  private known: Settings | null = null;
  private timer: NodeJS.Timeout | null = null;

  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    @Inject(ENVIRONMENT) private readonly environment: Environment,
    private readonly fixes: FixesService,
    private readonly shifts: ShiftsService,
    private readonly roster: RosterRepository,
    private readonly settings: SettingsService,
    private readonly crewProfiles: CrewProfiles,
    private readonly figures: ShiftFiguresRepository,
    private readonly toDo: FiguresToDo,
    private readonly changes: Changes,
    private readonly clock: Clock,
  ) {}

  onApplicationBootstrap(): void {
    this.known = this.settings.get();
    this.changes.all.subscribe((change) => {
      if (change.kind === 'marks')
        for (const roverId of this.shifts.roversSince(change.crewId, change.from))
          this.add(roverId, change.from, change.to);
      if (change.kind === 'assignment') this.add(change.roverId, change.from, this.clock.now());
      if (change.kind === 'crewProfile') this.addCrew(change.crewId);
      if (change.kind === 'holidays') this.addDays(change.days);
      if (change.kind === 'firm') this.compareSettings();
    });
    this.timer = setInterval(() => this.tick(BUDGET_MS), TICK_MS);
  }

  beforeApplicationShutdown(): void {
    if (this.timer) clearInterval(this.timer);
  }

  /** Everything that is to be done, and today of every rover. */
  flush(): void {
    while (this.tick(Infinity));
    for (const { roverId } of this.roster.list(this.clock.now())) this.refresh(roverId, 0);
  }

  /** Works for about so long; answers whether something of the past is left to do. */
  tick(budgetMs: number): boolean {
    const until = performance.now() + budgetMs;
    try {
      for (const one of together(this.toDo.some(500))) {
        this.work(one);
        if (performance.now() > until) return true;
      }
      if (budgetMs === Infinity) return this.toDo.some(1).length > 0;
      for (const { roverId } of this.roster.list(this.clock.now())) {
        this.refresh(roverId, FRESH_MS);
        if (performance.now() > until) break;
      }
    } catch (error) {
      this.logger.error({ err: error }, 'figures were not worked out; the next second goes on');
    }
    return false;
  }

  /** Works the figures of all time out again: after a change of zone or limits. */
  addAll(from: number): void {
    const now = this.clock.now();
    for (const { roverId } of this.roster.list(now)) {
      const first = this.fixes.firstHeardAt(roverId);
      if (first !== null) this.add(roverId, Math.max(first, from), now);
    }
  }

  /** Tolerance is judged by raw epochs: for as long as they are kept. */
  private addCrew(crewId: number): void {
    const from = this.rawFrom();
    for (const roverId of this.shifts.roversSince(crewId, from)) this.add(roverId, from, this.clock.now());
  }

  private addDays(days: readonly string[]): void {
    const { timeZone: zone } = this.settings.get();
    const now = this.clock.now();
    for (const day of days) {
      const { start, end } = localDayOf(DateTime.fromISO(day, { zone }).toMillis(), zone);
      if (start >= now) continue;
      for (const { roverId } of this.roster.list(now)) this.add(roverId, start, Math.min(end, now));
    }
  }

  private add(roverId: number, from: number, to: number): void {
    for (let start = from; start < to; start += PIECE_MS)
      this.toDo.add({ roverId, start, end: Math.min(start + PIECE_MS, to) });
  }

  private compareSettings(): void {
    const before = this.known;
    const now = this.settings.get();
    this.known = now;
    if (!before) return;
    const isSame = (name: 'timeZone' | 'limits' | 'toleranceProfile' | 'otherProfiles') =>
      JSON.stringify(before[name]) === JSON.stringify(now[name]);
    if (!isSame('timeZone') || !isSame('limits')) this.addAll(0);
    else if (!isSame('toleranceProfile') || !isSame('otherProfiles')) this.addAll(this.rawFrom());
  }

  private rawFrom(): number {
    return this.clock.now() - this.environment.RAW_EPOCH_DAYS * DAY_MS;
  }

  private refresh(roverId: number, freshMs: number): void {
    const now = this.clock.now();
    const known = this.live.get(roverId) ?? { at: 0, from: this.workedOutTo(roverId) };
    if (now - known.at < freshMs) return;
    this.work({ roverId, start: known.from, end: now, parts: [] });
    this.live.set(roverId, { at: now, from: now - STORED_MS });
  }

  /** Where to begin after a start: the last day that has rows may have been worked out before it was over. */
  private workedOutTo(roverId: number): number {
    const day = this.figures.lastDay(roverId);
    const now = this.clock.now();
    if (day === null) return now - LOOKED_BACK_MS;
    const { timeZone: zone } = this.settings.get();
    return Math.max(DateTime.fromISO(day, { zone }).toMillis(), now - LONGEST_BACK_MS);
  }

  private work(one: Work): void {
    const { timeZone: zone } = this.settings.get();
    const weeks = new Set<string>();
    this.database.transaction(() => {
      const window = { start: one.start, end: one.end + HOLD_MS };
      const shifts = this.shifts.roverShifts(one.roverId, window, zone);
      this.writeWithin(one.roverId, window, shifts);
      for (const day of this.daysOf(window, shifts, zone)) weeks.add(this.writeDay(one.roverId, day, zone));
      for (const part of one.parts) this.toDo.done(part);
    });
    for (const week of weeks) this.touchedWeeks.next(week);
  }

  private writeWithin(roverId: number, window: Interval, shifts: readonly RoverShift[]): void {
    const epochs = this.fixes.judgedEpochs(roverId, window.start - HOLD_MS, window.end);
    const first = epochs[0]?.time;
    // Of what raw epochs do not tell, or no longer, what was worked out stays.
    if (first === undefined) return;
    const known = { start: Math.max(window.start, first), end: window.end };
    const parts = judgedParts(known, shifts, this.crewProfiles.of(this.settings.get()));
    const spans = parts.flatMap(({ profile, ...part }) => withinSpans(epochs, profile, part));
    this.figures.replaceWithin(roverId, known, spans);
  }

  /** Local days of the window, and all of those that a shift touched by it reaches over. */
  private daysOf(window: Interval, shifts: readonly RoverShift[], zone: string): Interval[] {
    const now = this.clock.now();
    const start = Math.min(window.start, ...shifts.map((shift) => shift.start));
    const end = Math.min(now, Math.max(window.end, ...shifts.map((shift) => shift.end ?? now)));
    const days = [localDayOf(start, zone)];
    while (days.at(-1)!.end < end) days.push(localDayOf(days.at(-1)!.end, zone));
    return days;
  }

  private writeDay(roverId: number, interval: Interval, zone: string): string {
    const now = this.clock.now();
    const limits = detectorLimitsOf(this.settings.get().limits);
    const day = isoDateOf(interval.start, zone);
    const week = isoWeekOf(interval.start, zone);
    const mountPoint = this.roster.mountPointOf(roverId);
    const within = this.figures.withinSpans(roverId, interval);
    const rows = this.shifts.roverShifts(roverId, interval, zone).flatMap((shift): ShiftFigureRow[] => {
      const spans = this.fixes.spans(roverId, shift.start, Math.min(shift.end ?? now, now));
      const part = partFigures(shift, interval, spans, within, now, limits);
      if (!part) return [];
      const { totals, ...figures } = part;
      const { crewId, basis, start: shiftStart } = shift;
      return [{ roverId, shiftStart, day, week, crewId, basis, mountPoint, ...totals, ...figures }];
    });
    this.figures.replaceDay(roverId, day, rows);
    return week;
  }
}
