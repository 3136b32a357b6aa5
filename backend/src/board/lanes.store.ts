import { Inject, Injectable } from '@nestjs/common';
import type { Lane, LaneChange } from '@hubtack/contracts/board/lane.js';
import type { AgainReason } from '@hubtack/contracts/set-up/check-shot.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { firmSettings } from '@hubtack/drizzle/schema/firm-settings.js';
import { Clock } from '../common/clock.js';
import { localDayOf } from '../common/local-day.js';
import type { Interval } from '../common/interval.js';
import { DATABASE } from '../database/database.module.js';
import { FixesService } from '../fixes/fixes.service.js';
import type { HeardSpan } from '../fixes/timeline.js';
import { dutyAt, type CrewDay } from '../shifts/on-shift.js';
import { SettingsService } from '../settings/settings.service.js';
import { RoverBadgesRepository, type RoverBadge } from '../set-up/rover-badges.repository.js';
import { againReasonOf } from '../set-up/shot-validity.js';
import { ShiftsService } from '../shifts/shifts.service.js';
import { baseDistance } from '../common/base-distance.js';
import { nothingMoved, type LaneSource, type Moved } from './frame.js';
import { RIBBON_MS, laneChangeOf, laneOf, stateAt, type LaneFacts } from './live-lane.js';
import { RosterRepository, type RosterEntry } from '../rovers/roster.repository.js';

/** Check shots of yesterday still say that they are of yesterday. */
const SHOTS_BACK_MS = 24 * 3_600_000;
/** A rover without a crew has a lane only while it has been heard of in this time. */
const UNASSIGNED_MS = 24 * 3_600_000;

interface LiveLane extends LaneFacts {
  /** The last one grows in place. */
  spans: HeardSpan[];
  /** Spans have changed since they were read. */
  stale: boolean;
  /** The newest epoch that the distance to the base was worked out for. */
  measured: { latitude: number; longitude: number } | null;
  /** What the sweep last saw, to notice what only the clock changes. */
  seen: string;
}

/** The lanes as they stand, in memory: roster, today's spans and newest epoch of every rover on the board. */
@Injectable()
export class LanesStore implements LaneSource {
  private lanes = new Map<number, LiveLane>();
  private unassigned = new Map<number, RosterEntry>();
  private badges: ReadonlyMap<number, RoverBadge> = new Map();
  private day: Interval = { start: 0, end: 0 };
  private lostMs = 0;

  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly roster: RosterRepository,
    private readonly fixes: FixesService,
    private readonly shifts: ShiftsService,
    private readonly badgeRows: RoverBadgesRepository,
    private readonly settings: SettingsService,
    private readonly clock: Clock,
  ) {}

  get today(): Interval {
    return this.day;
  }

  ids(): number[] {
    return [...this.lanes.keys()];
  }

  facts(roverId: number): LaneFacts | undefined {
    const lane = this.lanes.get(roverId);
    if (lane) this.refresh(lane);
    return lane;
  }

  crewId(roverId: number): number | null {
    return this.lanes.get(roverId)?.entry.crewId ?? null;
  }

  change(roverId: number, withRibbon: boolean): LaneChange | undefined {
    const facts = this.facts(roverId);
    return facts && laneChangeOf(facts, this.clock.now(), withRibbon);
  }

  lane(roverId: number): Lane | undefined {
    const facts = this.facts(roverId);
    return facts && laneOf(facts, this.clock.now());
  }

  /** Reads roster, shifts and day anew; answers what is to be described anew, and who had it before. */
  reload(): Moved {
    const now = this.clock.now();
    const zone =
      this.database.select({ zone: firmSettings.timeZone }).from(firmSettings).get()?.zone ?? 'UTC';
    this.day = localDayOf(now, zone);
    const before = this.lanes;
    const crewDays = new Map<number, CrewDay>();
    const crewDayOf = (crewId: number | null): CrewDay => {
      if (crewId === null) return { basis: 'noShiftSet', onShift: [], pauses: [] };
      const known = crewDays.get(crewId) ?? this.shifts.crewDay(crewId, this.day, zone);
      crewDays.set(crewId, known);
      return known;
    };
    this.lanes = new Map();
    this.unassigned = new Map();
    this.lostMs = this.settings.get().checkShotLimits.againAfterLostMinutes * 60_000;
    this.badges = this.badgeRows.newest(this.day.start, this.day.start - SHOTS_BACK_MS);
    for (const entry of this.roster.list(now)) {
      const lastHeardAt = this.fixes.lastHeardAt(entry.roverId);
      if (entry.crewId === null && (lastHeardAt === null || lastHeardAt < now - UNASSIGNED_MS))
        this.unassigned.set(entry.roverId, entry);
      else this.lanes.set(entry.roverId, this.liveLane(entry, crewDayOf(entry.crewId)));
    }
    return this.movedSince(before);
  }

  /** A rover was heard; answers false when it has no lane. */
  heard(roverId: number, spansChanged: boolean): 'known' | 'new' | 'none' {
    const lane = this.lanes.get(roverId);
    if (lane) {
      lane.latest = this.fixes.latest(roverId);
      if (spansChanged) lane.stale = true;
      return 'known';
    }
    const entry = this.unassigned.get(roverId);
    const lastHeardAt = this.fixes.lastHeardAt(roverId);
    if (!entry || lastHeardAt === null || lastHeardAt < this.clock.now() - UNASSIGNED_MS) return 'none';
    this.unassigned.delete(roverId);
    this.lanes.set(roverId, this.liveLane(entry, { basis: 'noShiftSet', onShift: [], pauses: [] }));
    return 'new';
  }

  /** Lanes that the clock alone has changed: gone silent, or begun or ended a shift or a pause. */
  movedByClock(): number[] {
    const now = this.clock.now();
    const moved: number[] = [];
    for (const [roverId, lane] of this.lanes) {
      this.refresh(lane);
      const seen = `${stateAt(lane.spans, now).state} ${dutyAt(lane.crewDay, now)}`;
      if (seen !== lane.seen) moved.push(roverId);
      lane.seen = seen;
    }
    return moved;
  }

  /** Lanes whose check shot has come to count no more, or counts again with late sentences. */
  badgesMoved(): number[] {
    const now = this.clock.now();
    const moved: number[] = [];
    for (const [roverId, lane] of this.lanes) {
      const again = this.againOf(lane, now);
      if (again === lane.again) continue;
      lane.again = again;
      moved.push(roverId);
    }
    return moved;
  }

  private againOf({ badge, entry, latest, spans }: LiveLane, now: number): AgainReason | null {
    if (!badge?.shot) return null;
    const { mountPoint } = entry;
    const rover = {
      now,
      dayStart: this.day.start,
      stationId: latest?.stationId ?? null,
      mountPoint,
      card: badge.card,
      spans,
    };
    return againReasonOf(badge.shot, rover, this.lostMs);
  }

  private movedSince(before: ReadonlyMap<number, LiveLane>): Moved {
    const moved = nothingMoved();
    for (const id of [...before.keys(), ...this.lanes.keys()]) moved.whole.add(id);
    for (const [id, { entry }] of before)
      if (entry.crewId !== null) moved.left.set(id, new Set([entry.crewId]));
    return moved;
  }

  private liveLane(entry: RosterEntry, crewDay: CrewDay): LiveLane {
    const lane: LiveLane = {
      entry,
      day: this.day,
      crewDay,
      spans: [],
      latest: this.fixes.latest(entry.roverId),
      baseDistanceM: null,
      stale: true,
      measured: null,
      seen: '',
      badge: this.badges.get(entry.roverId) ?? null,
      again: null,
    };
    if (lane.badge?.shot) this.refresh(lane);
    lane.again = this.againOf(lane, this.clock.now());
    return lane;
  }

  /** Brings spans and distance up to date when something asks for the lane, not at every epoch. */
  private refresh(lane: LiveLane): void {
    const { roverId } = lane.entry;
    const now = this.clock.now();
    if (lane.stale) {
      const from = Math.min(this.day.start, now - RIBBON_MS);
      // A receiver whose clock is a little ahead has begun its newest run after our now.
      lane.spans = this.fixes.spans(roverId, from, Number.MAX_SAFE_INTEGER);
      lane.stale = false;
    }
    const last = lane.spans.at(-1);
    const grownTo = this.fixes.heldUntil(roverId);
    if (last && grownTo !== null) last.end = grownTo;
    this.measureBase(lane);
  }

  private measureBase(lane: LiveLane): void {
    const { latest, entry, measured } = lane;
    if (latest?.latitude == null || latest.longitude === null) return;
    const { baseLatitude, baseLongitude } = entry;
    if (baseLatitude === null || baseLongitude === null) return;
    const { latitude, longitude } = latest;
    if (measured && measured.latitude === latitude && measured.longitude === longitude) return;
    lane.measured = { latitude, longitude };
    lane.baseDistanceM = baseDistance(latitude, longitude, baseLatitude, baseLongitude);
  }
}
