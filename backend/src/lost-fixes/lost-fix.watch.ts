import {
  Inject,
  Injectable,
  Logger,
  type BeforeApplicationShutdown,
  type OnApplicationBootstrap,
} from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import { DATABASE } from '../database/database.module.js';
import { CommitQueue } from '../fixes/commit.queue.js';
import { FixesService } from '../fixes/fixes.service.js';
import { RosterRepository } from '../rovers/roster.repository.js';
import { SettingsService } from '../settings/settings.service.js';
import { ShiftsService } from '../shifts/shifts.service.js';
import { EpisodeKeeper, type Look } from './episode.keeper.js';
import { isChattering } from './chattering.js';
import { EvidenceReader } from './evidence.reader.js';
import { LostFixRepository } from './lost-fix.repository.js';
import { LostFixWriter } from './lost-fix.writer.js';
import { OutageKeeper } from './outage.keeper.js';
import { isWorking, watch, type WatchedRover } from './watched-rover.js';

const SWEEP_MS = 1000;
/** After a start everything from this long ago on is worked out again: a shift may have ended meanwhile. */
const LOOKED_BACK_MS = 24 * 3_600_000;

/**
 * Watches the timeline of every rover once a second and keeps lost fixes in step with it. Nothing it keeps in memory is needed
 * again: after a restart it works out the same from what is stored.
 */
@Injectable()
export class LostFixWatch implements OnApplicationBootstrap, BeforeApplicationShutdown {
  private readonly logger = new Logger(LostFixWatch.name);
  private rovers = new Map<number, WatchedRover>();
  private isRosterStale = true;
  private timer: NodeJS.Timeout | null = null;

  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly queue: CommitQueue,
    private readonly changes: Changes,
    private readonly clock: Clock,
    private readonly fixes: FixesService,
    private readonly roster: RosterRepository,
    private readonly shifts: ShiftsService,
    private readonly settings: SettingsService,
    private readonly lostFixes: LostFixRepository,
    private readonly writer: LostFixWriter,
    private readonly episodes: EpisodeKeeper,
    private readonly outages: OutageKeeper,
    private readonly evidence: EvidenceReader,
  ) {}

  onApplicationBootstrap(): void {
    this.outages.restore();
    this.queue.changes.subscribe((changes) => {
      for (const { roverId, spansChanged, from } of changes) {
        if (spansChanged) this.setBack(roverId, from);
      }
    });
    this.changes.all.subscribe((change) => {
      if (change.kind === 'firm') this.isRosterStale = true;
      if (change.kind === 'marks') this.setCrewBack(change.crewId, change.from);
      if (change.kind === 'assignment') this.forgetShifts(change.roverId, change.from);
    });
    this.timer = setInterval(() => this.sweep(), SWEEP_MS);
  }

  beforeApplicationShutdown(): void {
    if (this.timer) clearInterval(this.timer);
  }

  /** As after a start: everything is read anew at the next look. */
  forget(): void {
    this.writer.takeTouched();
    this.rovers.clear();
    this.isRosterStale = true;
    this.outages.restore();
  }

  /** One look at everything that may have moved. */
  sweep(): void {
    const now = this.clock.now();
    try {
      this.database.transaction(() => this.look(now));
    } catch (error) {
      // The write was undone: what is in memory is read anew at the next sweep.
      this.logger.error({ err: error }, 'watching lost fixes failed; the next second tries again');
      this.forget();
      return;
    }
    const lostFixIds = this.writer.takeTouched();
    if (lostFixIds.length > 0) this.changes.announce({ kind: 'lostFix', lostFixIds });
  }

  private look(now: number): void {
    if (this.isRosterStale) this.readRoster(now);
    const { timeZone: zone, limits } = this.settings.get();
    const look: Look = { now, zone, limits };
    for (const rover of this.rovers.values()) {
      this.outages.follow(rover, now, limits);
      if (rover.shifts === null || now >= rover.shiftsWindow.end) this.episodes.shiftsOf(rover, now, look);
    }
    this.outages.sweep(this.rovers.values(), now, limits);
    for (const rover of this.rovers.values()) if (this.needsLook(rover, now)) this.episodes.look(rover, look);
    this.bringBack(now);
  }

  /** A rover that is well, or off shift with nothing open, needs none until something comes in or its hold time runs out. */
  private needsLook(rover: WatchedRover, now: number): boolean {
    if (rover.isStale || rover.hasOpen) return true;
    const heldUntil = this.fixes.heldUntil(rover.entry.roverId);
    if (!isWorking(rover, now, heldUntil)) return false;
    return (heldUntil ?? 0) <= now || !this.fixes.isFixed(rover.entry.roverId);
  }

  private readRoster(now: number): void {
    const before = this.rovers;
    this.rovers = new Map();
    for (const entry of this.roster.list(now)) {
      const known = before.get(entry.roverId);
      const rover = known ?? watch(entry, now - LOOKED_BACK_MS);
      if (rover.entry.mountPoint !== entry.mountPoint) rover.mountPointSince = now;
      rover.entry = entry;
      rover.shifts = null;
      rover.isStale = true;
      this.rovers.set(entry.roverId, rover);
    }
    // A rover that has been put away has no shift to go on in.
    for (const { id, roverId } of this.lostFixes.openRows())
      if (roverId !== null && !this.rovers.has(roverId)) this.writer.end(id, now, 'shiftEnd');
    this.isRosterStale = false;
  }

  /** Lost fixes that have not ended and are not closed. */
  openIds(): number[] {
    return this.lostFixes.openRows().map(({ id }) => id);
  }

  /** A person has done something about a lost fix of this rover. */
  lookAgain(roverId: number): void {
    const rover = this.rovers.get(roverId);
    if (rover) rover.hasOpen = true;
  }

  private setBack(roverId: number, from: number | null): void {
    const rover = this.rovers.get(roverId);
    if (!rover) return;
    rover.isStale = true;
    if (from === null) return;
    rover.lookedAt = Math.min(rover.lookedAt, from);
    this.evidence.forgetSince(roverId, from);
  }

  private setCrewBack(crewId: number, from: number): void {
    for (const roverId of this.shifts.roversSince(crewId, from)) this.forgetShifts(roverId, from);
  }

  private forgetShifts(roverId: number, from: number): void {
    const rover = this.rovers.get(roverId);
    if (!rover) return;
    rover.shifts = null;
    rover.isStale = true;
    rover.lookedAt = Math.min(rover.lookedAt, from);
  }

  /** What only the clock brings about: the end of a shelf, the end of chattering. */
  private bringBack(now: number): void {
    for (const row of this.lostFixes.openRows()) {
      if (row.shelvedUntil !== null && row.shelvedUntil <= now) {
        this.writer.change(row.id, { shelvedUntil: null, shelvedBy: null, shelfReason: null });
        this.writer.note(row.id, 'backFromShelf', 'Back from the shelf', row.shelvedUntil);
      }
      if (row.isChattering && row.roverId !== null) {
        const raised = this.lostFixes
          .ofRover(row.roverId, row.raisedAt - 3_600_000, now)
          .map(({ raisedAt }) => raisedAt)
          .toSorted((a, b) => a - b);
        if (!isChattering(raised, now)) this.writer.change(row.id, { isChattering: false });
      }
    }
  }
}
