import {
  Injectable,
  Logger,
  type BeforeApplicationShutdown,
  type OnApplicationBootstrap,
} from '@nestjs/common';
import type { BoardSnapshot, BoardToday, Lane } from '@hubtack/contracts/board/lane.js';
import type { Response } from 'express';
import { addTotals, noTotals } from '@hubtack/contracts/fixes/totals.js';
import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import { CommitQueue } from '../fixes/commit.queue.js';
import type { RoverChange } from '../fixes/timeline.writer.js';
import { forChief } from '../lost-fixes/lost-fix.view.js';
import { LostFixesService } from '../lost-fixes/lost-fixes.service.js';
import { MetricsService } from '../metrics/metrics.service.js';
import { addMoved, eventText, nothingMoved, seesCrew, type Audience } from './frame.js';
import { NoticesService } from '../notices/notices.service.js';
import { LanesStore } from './lanes.store.js';
import { hourTotals, todayTotals } from './live-lane.js';
import { StreamHub } from './stream.hub.js';
import { StreamReader } from './stream.reader.js';

/** At most one frame in this time; the first change after a rest goes out at once. */
const FRAME_MS = 250;
const SWEEP_MS = 250;

/** Keeps the board's lanes, and sends what moves. */
@Injectable()
export class BoardService implements OnApplicationBootstrap, BeforeApplicationShutdown {
  private readonly logger = new Logger(BoardService.name);
  private readonly hub: StreamHub;
  private moved = nothingMoved();
  private ribbons = new Set<number>();
  private frameTimer: NodeJS.Timeout | null = null;
  private lastFrameAt = 0;
  private sweepTimer: NodeJS.Timeout | null = null;

  constructor(
    private readonly lanes: LanesStore,
    private readonly lostFixes: LostFixesService,
    private readonly notices: NoticesService,
    private readonly queue: CommitQueue,
    private readonly changes: Changes,
    private readonly clock: Clock,
    metrics: MetricsService,
  ) {
    this.hub = new StreamHub(lanes, { lostFixes: (ids) => lostFixes.withCrews(ids) }, metrics);
  }

  onApplicationBootstrap(): void {
    this.lanes.reload();
    this.queue.changes.subscribe((changes) => this.heard(changes));
    this.changes.all.subscribe((change) => {
      if (change.kind === 'firm') this.reload();
      if (change.kind === 'sessions') this.hub.endSessions(change.sessionIds);
      if (change.kind === 'lostFix') this.moveLostFixes(change.lostFixIds);
    });
    this.notices.told.subscribe(({ userId, notice }) => {
      const isForMailOnly = notice.ways.every((way) => way === 'mail');
      if (!isForMailOnly) this.hub.tell(userId, eventText('notice', notice), this.clock.now());
    });
    this.sweepTimer = setInterval(() => this.sweep(), SWEEP_MS);
  }

  beforeApplicationShutdown(): void {
    if (this.sweepTimer) clearInterval(this.sweepTimer);
    if (this.frameTimer) clearTimeout(this.frameTimer);
    this.hub.endAll();
  }

  /** The lanes that an audience may see, and the cursor to follow on from. */
  snapshot(audience: Audience): BoardSnapshot {
    const lanes = this.visibleIds(audience)
      .map((id) => this.lanes.lane(id))
      .filter((lane): lane is Lane => lane !== undefined);
    return {
      cursor: this.hub.cursor,
      serverTime: this.clock.now(),
      lanes,
      lostFixes: this.openLostFixes(audience),
    };
  }

  /** On-shift time of today by state, summed over each crew's rovers. */
  today(audience: Audience): BoardToday {
    const now = this.clock.now();
    const crews = new Map<number, BoardToday['crews'][number]>();
    for (const id of this.visibleIds(audience)) {
      const facts = this.lanes.facts(id);
      const { crewId, crewName } = facts?.entry ?? {};
      if (!facts || crewId == null || crewName == null) continue;
      const crew = crews.get(crewId) ?? { crewId, crewName, totals: noTotals(), hours: [] };
      crew.totals = addTotals(crew.totals, todayTotals(facts, now));
      for (const hour of hourTotals(facts, now)) {
        const known = crew.hours.find(({ start }) => start === hour.start);
        if (known) known.totals = addTotals(known.totals, hour.totals);
        else crew.hours.push(hour);
      }
      crew.hours.sort((a, b) => a.start - b.start);
      crews.set(crewId, crew);
    }
    const { start: dayStart, end: dayEnd } = this.lanes.today;
    return {
      dayStart,
      dayEnd,
      crews: [...crews.values()].sort((a, b) => a.crewName.localeCompare(b.crewName)),
    };
  }

  /** Connects a board; its stream ends by `endsAt`. */
  follow(
    response: Response,
    viewer: {
      audience: Audience;
      sessionId: string;
      userId: number | null;
      endsAt: number;
      cursor: string | undefined;
    },
  ): void {
    const { audience, sessionId, userId, endsAt, cursor } = viewer;
    const reader = new StreamReader(response, audience, sessionId, userId, endsAt, (slow) =>
      this.hub.drained(slow, this.clock.now()),
    );
    response.once('close', () => this.hub.leave(reader));
    this.hub.join(reader, cursor, this.clock.now());
  }

  private visibleIds(audience: Audience): number[] {
    return this.lanes.ids().filter((id) => seesCrew(audience, this.lanes.crewId(id)));
  }

  private openLostFixes(audience: Audience): LostFix[] {
    return this.lostFixes
      .withCrews(this.lostFixes.openIds())
      .filter(({ crewIds }) => audience === 'office' || crewIds.some((crewId) => seesCrew(audience, crewId)))
      .map(({ lostFix }) => (audience === 'office' ? lostFix : forChief(lostFix)));
  }

  private moveLostFixes(ids: readonly number[]): void {
    for (const id of ids) this.moved.lostFixes.add(id);
    this.scheduleFrame();
  }

  private heard(changes: readonly RoverChange[]): void {
    for (const { roverId, spansChanged } of changes) {
      const lane = this.lanes.heard(roverId, spansChanged);
      if (lane === 'none') continue;
      if (lane === 'new') this.moved.whole.add(roverId);
      else this.moved.changed.add(roverId);
      if (spansChanged) this.ribbons.add(roverId);
    }
    this.scheduleFrame();
  }

  private reload(): void {
    addMoved(this.moved, this.lanes.reload());
    this.scheduleFrame();
  }

  private scheduleFrame(): void {
    if (this.frameTimer !== null) return;
    const wait = Math.max(0, this.lastFrameAt + FRAME_MS - this.clock.now());
    this.frameTimer = setTimeout(() => this.frame(), Math.min(wait, FRAME_MS));
  }

  private frame(): void {
    this.frameTimer = null;
    this.lastFrameAt = this.clock.now();
    const { moved, ribbons } = this;
    this.moved = nothingMoved();
    this.ribbons = new Set();
    this.hub.publish(moved, ribbons, this.lastFrameAt);
  }

  /** What changes without any sentence: silence, shifts, midnight, and streams that need a beat or an end. */
  private sweep(): void {
    const now = this.clock.now();
    try {
      const { start, end } = this.lanes.today;
      if (now < start || now >= end) this.reload();
      const moved = this.lanes.movedByClock();
      for (const id of moved) this.moved.changed.add(id);
      const badges = this.lanes.badgesMoved();
      for (const id of badges) this.moved.whole.add(id);
      if (moved.length + badges.length > 0) this.scheduleFrame();
      this.hub.sweep(now);
    } catch (error) {
      // A locked database must not end the board; the next sweep tries again.
      this.logger.warn({ err: error }, 'board sweep failed');
    }
  }
}
