import { Inject, Injectable } from '@nestjs/common';
import type { SetUpCard } from '@hubtack/contracts/set-up/set-up-card.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { correctionSources } from '@hubtack/drizzle/schema/correction-sources.js';
import { roverAssignments, rovers } from '@hubtack/drizzle/schema/rovers.js';
import { setUpCards } from '@hubtack/drizzle/schema/set-up-cards.js';
import { and, desc, eq, gt, gte, isNull, lte, or, type SQL } from 'drizzle-orm';
import { DATABASE } from '../database/database.module.js';

const HISTORY = 30;

@Injectable()
export class SetUpCardsRepository {
  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {}

  insert(values: typeof setUpCards.$inferInsert): number {
    return this.database.insert(setUpCards).values(values).returning({ id: setUpCards.id }).get().id;
  }

  get(id: number): SetUpCard | undefined {
    return this.select(eq(setUpCards.id, id), 1)[0];
  }

  /** Of a rover since an instant, newest first. */
  ofRover(roverId: number, from: number, most = HISTORY): SetUpCard[] {
    return this.select(and(eq(setUpCards.roverId, roverId), gte(setUpCards.at, from)), most);
  }

  /** The newest card of a rover in [from, to]. */
  newest(roverId: number, from: number, to: number): SetUpCard | undefined {
    const when = and(eq(setUpCards.roverId, roverId), gte(setUpCards.at, from), lte(setUpCards.at, to));
    return this.select(when, 1)[0];
  }

  /** Whose the rover was at an instant. */
  crewAt(roverId: number, at: number): number | null {
    const row = this.database
      .select({ crewId: roverAssignments.crewId })
      .from(roverAssignments)
      .where(
        and(
          eq(roverAssignments.roverId, roverId),
          lte(roverAssignments.startAt, at),
          or(isNull(roverAssignments.endAt), gt(roverAssignments.endAt, at)),
        ),
      )
      .get();
    return row?.crewId ?? null;
  }

  private select(where: SQL | undefined, most: number): SetUpCard[] {
    return this.database
      .select({ card: setUpCards, rover: rovers, source: correctionSources })
      .from(setUpCards)
      .innerJoin(rovers, eq(rovers.id, setUpCards.roverId))
      .leftJoin(correctionSources, eq(correctionSources.id, setUpCards.correctionSourceId))
      .where(where)
      .orderBy(desc(setUpCards.at), desc(setUpCards.id))
      .limit(most)
      .all()
      .map(({ card, rover, source }) => ({
        ...card,
        at: new Date(card.at).toISOString(),
        roverLabel: rover.label,
        sourceName: source?.name ?? null,
        mountPoint: source?.mountPoint ?? null,
      }));
  }
}
