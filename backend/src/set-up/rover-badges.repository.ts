import { Inject, Injectable } from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { checkShots } from '@hubtack/drizzle/schema/check-shots.js';
import { rovers } from '@hubtack/drizzle/schema/rovers.js';
import { setUpCards } from '@hubtack/drizzle/schema/set-up-cards.js';
import { eq, gte, sql } from 'drizzle-orm';
import { DATABASE } from '../database/database.module.js';
import type { CardFacts, ShotFacts } from './shot-validity.js';

export interface RoverBadge {
  card: (CardFacts & { at: number; by: string }) | null;
  shot: (ShotFacts & { horizontalM: number; passed: boolean }) | null;
}

/** What lanes say of set-up cards and check shots: the newest of each rover. */
@Injectable()
export class RoverBadgesRepository {
  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {}

  /** By rover; cards since `dayStart`, check shots since `since`. */
  newest(dayStart: number, since: number): Map<number, RoverBadge> {
    const badges = new Map<number, RoverBadge>();
    const badgeOf = (roverId: number): RoverBadge => {
      const known = badges.get(roverId) ?? { card: null, shot: null };
      badges.set(roverId, known);
      return known;
    };
    for (const { card } of this.cardsSince(dayStart)) badgeOf(card.roverId).card = card;
    for (const { shot, card } of this.shotsSince(since)) {
      const { at, stationId, mountPoint, passed, result } = shot;
      badgeOf(shot.roverId).shot = {
        at,
        stationId,
        mountPoint,
        card,
        passed,
        horizontalM: result.horizontalM,
      };
    }
    return badges;
  }

  /** The newest of each rover, looked up rover by rover: there is one card for each rover and day, for years. */
  private cardsSince(from: number) {
    const newest = sql`(SELECT newest.id FROM ${setUpCards} AS newest WHERE newest.rover_id = ${rovers.id}
      AND newest.at >= ${from} ORDER BY newest.at DESC, newest.id DESC LIMIT 1)`;
    return this.database
      .select({ card: setUpCards })
      .from(rovers)
      .innerJoin(setUpCards, eq(setUpCards.id, newest))
      .all();
  }

  private shotsSince(from: number) {
    const newest = this.database
      .select({ id: sql<number>`max(${checkShots.id})` })
      .from(checkShots)
      .where(gte(checkShots.at, from))
      .groupBy(checkShots.roverId);
    return this.database
      .select({ shot: checkShots, card: setUpCards })
      .from(checkShots)
      .leftJoin(setUpCards, eq(setUpCards.id, checkShots.setUpCardId))
      .where(sql`${checkShots.id} IN ${newest}`)
      .all();
  }
}
