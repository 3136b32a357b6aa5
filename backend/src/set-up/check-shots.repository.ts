import { Inject, Injectable } from '@nestjs/common';
import type { CheckShot } from '@hubtack/contracts/set-up/check-shot.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { checkShots } from '@hubtack/drizzle/schema/check-shots.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { rovers } from '@hubtack/drizzle/schema/rovers.js';
import { and, desc, eq, gte, lt, type SQL } from 'drizzle-orm';
import { DATABASE } from '../database/database.module.js';

const MOST = 200;

interface Which {
  roverId?: number | undefined;
  crewId?: number | undefined;
  from?: number | undefined;
  to?: number | undefined;
}

@Injectable()
export class CheckShotsRepository {
  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {}

  insert(values: typeof checkShots.$inferInsert): number {
    return this.database.insert(checkShots).values(values).returning({ id: checkShots.id }).get().id;
  }

  get(id: number): CheckShot | undefined {
    return this.select(eq(checkShots.id, id), 1)[0];
  }

  /** Newest first. */
  list({ roverId, crewId, from, to }: Which, most = MOST): CheckShot[] {
    const conditions = [
      roverId === undefined ? undefined : eq(checkShots.roverId, roverId),
      crewId === undefined ? undefined : eq(checkShots.crewId, crewId),
      from === undefined ? undefined : gte(checkShots.at, from),
      to === undefined ? undefined : lt(checkShots.at, to),
    ];
    return this.select(and(...conditions), most);
  }

  private select(where: SQL | undefined, most: number): CheckShot[] {
    return this.database
      .select({ shot: checkShots, roverLabel: rovers.label, crewName: crews.name })
      .from(checkShots)
      .innerJoin(rovers, eq(rovers.id, checkShots.roverId))
      .leftJoin(crews, eq(crews.id, checkShots.crewId))
      .where(where)
      .orderBy(desc(checkShots.at), desc(checkShots.id))
      .limit(most)
      .all()
      .map(
        ({ shot: { result, at, setUpCardId: _card, passed: _passed, ...shot }, roverLabel, crewName }) => ({
          ...result,
          ...shot,
          at: new Date(at).toISOString(),
          roverLabel,
          crewName,
        }),
      );
  }
}
