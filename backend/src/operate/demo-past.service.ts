import { Inject, Injectable } from '@nestjs/common';
import { causeLabels, type ConfirmedCause } from '@hubtack/contracts/lost-fixes/cause.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { lostFixHistory, lostFixes } from '@hubtack/drizzle/schema/lost-fixes.js';
import { shiftFigures } from '@hubtack/drizzle/schema/shift-figures.js';
import { demoCauseOf } from '@hubtack/drizzle/seeds/demo-causes.js';
import { and, eq, isNotNull, lt } from 'drizzle-orm';
import { Clock } from '../common/clock.js';
import { localDayOf } from '../common/local-day.js';
import { DATABASE } from '../database/database.module.js';
import { EpisodeKeeper } from '../lost-fixes/episode.keeper.js';
import { watch } from '../lost-fixes/watched-rover.js';
import { RosterRepository } from '../rovers/roster.repository.js';
import { SettingsService } from '../settings/settings.service.js';
import { FiguresKeeper } from '../weekly/figures.keeper.js';

const MISTYPED = 'TANF0O';
const WEEKS_MS = 13 * 7 * 86_400_000;
/** What ended within this time is left for whoever tries the demo to close. */
const LEFT_OPEN_MS = 3 * 3_600_000;

/** The demo's twelve weeks as they would stand had the program run: lost fixes by the detector, closed with invented causes; figures. */
@Injectable()
export class DemoPastService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly roster: RosterRepository,
    private readonly episodes: EpisodeKeeper,
    private readonly settings: SettingsService,
    private readonly figures: FiguresKeeper,
    private readonly clock: Clock,
  ) {}

  fill(): void {
    const now = this.clock.now();
    const { timeZone: zone, limits } = this.settings.get();
    this.database.transaction(() => {
      for (const entry of this.roster.list(now))
        this.episodes.look(watch(entry, now - WEEKS_MS), { now, zone, limits });
      this.close(now - LEFT_OPEN_MS);
    });
    this.figures.addAll(0);
    this.figures.flush();
    // The mistyped mount point of today was right on the days before.
    const today = localDayOf(now, zone);
    this.database
      .update(lostFixes)
      .set({ mountPoint: 'TANF00' })
      .where(and(eq(lostFixes.mountPoint, MISTYPED), lt(lostFixes.startAt, today.start)))
      .run();
    this.database
      .update(shiftFigures)
      .set({ mountPoint: 'TANF00' })
      .where(and(eq(shiftFigures.mountPoint, MISTYPED), lt(shiftFigures.startAt, today.start)))
      .run();
  }

  private close(before: number): void {
    const ended = this.database
      .select({ id: lostFixes.id, endAt: lostFixes.endAt, mountPoint: lostFixes.mountPoint })
      .from(lostFixes)
      .where(and(isNotNull(lostFixes.endAt), lt(lostFixes.endAt, before)))
      .all();
    for (const { id, endAt, mountPoint } of ended) {
      const cause: ConfirmedCause | null = demoCauseOf(id, mountPoint);
      if (cause === null) continue;
      const at = endAt! + 600_000;
      const closedBy = 'Dispatcher';
      this.database
        .update(lostFixes)
        .set({ closedAt: at, closedBy, confirmedCause: cause })
        .where(eq(lostFixes.id, id))
        .run();
      this.database
        .insert(lostFixHistory)
        .values({ lostFixId: id, at, by: closedBy, kind: 'closed', text: causeLabels[cause] })
        .run();
    }
  }
}
