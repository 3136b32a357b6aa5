import { Inject, Injectable } from '@nestjs/common';
import type { HistoryEntry, LostFixQuery } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { lostFixHistory, lostFixPhotos, lostFixes } from '@hubtack/drizzle/schema/lost-fixes.js';
import { rovers } from '@hubtack/drizzle/schema/rovers.js';
import { sites } from '@hubtack/drizzle/schema/sites.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import { and, asc, desc, eq, gte, inArray, isNotNull, isNull, lt, ne, or, sql, type SQL } from 'drizzle-orm';
import { DATABASE } from '../database/database.module.js';
import type { LostFixRecord, LostFixRow } from './lost-fix.view.js';

export type NewLostFix = typeof lostFixes.$inferInsert;
export type LostFixChange = Partial<Omit<NewLostFix, 'id'>>;

/** Neither closed, nor withdrawn before anybody had to do with it. */
const isActive = and(
  isNull(lostFixes.closedAt),
  or(
    isNull(lostFixes.ending),
    ne(lostFixes.ending, 'withdrawn'),
    isNotNull(lostFixes.flagAt),
    isNotNull(lostFixes.takenAt),
  ),
);

@Injectable()
export class LostFixRepository {
  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {}

  insert(values: NewLostFix): number {
    return this.database.insert(lostFixes).values(values).returning({ id: lostFixes.id }).get().id;
  }

  update(id: number, change: LostFixChange): void {
    this.database.update(lostFixes).set(change).where(eq(lostFixes.id, id)).run();
  }

  addHistory(lostFixId: number, entry: Omit<HistoryEntry, 'id'>): void {
    this.database
      .insert(lostFixHistory)
      .values({ lostFixId, ...entry })
      .run();
  }

  row(id: number): LostFixRow | undefined {
    return this.database.select().from(lostFixes).where(eq(lostFixes.id, id)).get();
  }

  /** Rows of a rover that start in [from, to), and those that have not ended. */
  ofRover(roverId: number, from: number, to: number): LostFixRow[] {
    return this.database
      .select()
      .from(lostFixes)
      .where(
        and(
          eq(lostFixes.roverId, roverId),
          or(
            and(gte(lostFixes.startAt, from), lt(lostFixes.startAt, to)),
            and(isNull(lostFixes.endAt), isNull(lostFixes.closedAt)),
          ),
        ),
      )
      .orderBy(asc(lostFixes.startAt))
      .all();
  }

  /** Rows that have not ended and are not closed. */
  openRows(): LostFixRow[] {
    return this.database
      .select()
      .from(lostFixes)
      .where(and(isNull(lostFixes.endAt), isNull(lostFixes.closedAt)))
      .all();
  }

  members(sharedId: number): LostFixRow[] {
    return this.database.select().from(lostFixes).where(eq(lostFixes.sharedId, sharedId)).all();
  }

  /** With names and counts, in the order of the ids given. */
  records(ids: readonly number[]): LostFixRecord[] {
    const found = this.select(inArray(lostFixes.id, [...ids]));
    return ids.map((id) => found.find(({ row }) => row.id === id)).filter((record) => record !== undefined);
  }

  memberRecords(sharedId: number): LostFixRecord[] {
    return this.select(eq(lostFixes.sharedId, sharedId));
  }

  /** The desk's list, newest first. `crewId`: only of this crew. */
  list(query: LostFixQuery, limit: number): LostFixRecord[] {
    const conditions: (SQL | undefined)[] = [];
    if (query.status === 'active') conditions.push(isActive);
    if (query.status === 'closed') conditions.push(isNotNull(lostFixes.closedAt));
    if (query.roverId !== undefined) conditions.push(eq(lostFixes.roverId, query.roverId));
    if (query.crewId !== undefined) conditions.push(eq(lostFixes.crewId, query.crewId));
    if (query.mountPoint !== undefined) conditions.push(eq(lostFixes.mountPoint, query.mountPoint));
    if (query.before !== undefined) conditions.push(lt(lostFixes.id, query.before));
    return this.select(and(...conditions), limit);
  }

  /** Of a crew, that overlap [from, to). */
  ofCrew(crewId: number, from: number, to: number): LostFixRecord[] {
    return this.select(
      and(
        eq(lostFixes.crewId, crewId),
        lt(lostFixes.startAt, to),
        or(isNull(lostFixes.endAt), gte(lostFixes.endAt, from)),
      ),
    );
  }

  history(lostFixIds: readonly number[]): HistoryEntry[] {
    return this.database
      .select()
      .from(lostFixHistory)
      .where(inArray(lostFixHistory.lostFixId, [...lostFixIds]))
      .orderBy(asc(lostFixHistory.at), asc(lostFixHistory.id))
      .all()
      .map(({ lostFixId: _of, ...entry }) => entry);
  }

  photos(lostFixId: number) {
    return this.database
      .select()
      .from(lostFixPhotos)
      .where(eq(lostFixPhotos.lostFixId, lostFixId))
      .orderBy(asc(lostFixPhotos.id))
      .all()
      .map(({ id, at, by, width, height }) => ({ id, at, by, width, height }));
  }

  private select(where: SQL | undefined, limit = 2000): LostFixRecord[] {
    const members = sql<number>`(SELECT count(*) FROM lost_fixes AS m WHERE m.shared_id = ${lostFixes.id})`;
    const photos = sql<number>`(SELECT count(*) FROM lost_fix_photos AS p WHERE p.lost_fix_id = ${lostFixes.id})`;
    const newestAdvice = sql<number | null>`(SELECT max(h.id) FROM lost_fix_history AS h
      WHERE h.kind = 'advice' AND h.lost_fix_id IN (${lostFixes.id}, ${lostFixes.sharedId}))`;
    return this.database
      .select({
        row: lostFixes,
        roverLabel: rovers.label,
        crewName: crews.name,
        crewPhone: crews.phone,
        siteName: sites.name,
        takenBy: users.name,
        members,
        photos,
        advice: { at: lostFixHistory.at, by: lostFixHistory.by, text: lostFixHistory.text },
      })
      .from(lostFixes)
      .leftJoin(rovers, eq(rovers.id, lostFixes.roverId))
      .leftJoin(crews, eq(crews.id, lostFixes.crewId))
      .leftJoin(sites, eq(sites.id, crews.siteId))
      .leftJoin(users, eq(users.id, lostFixes.takenByUserId))
      .leftJoin(lostFixHistory, eq(lostFixHistory.id, newestAdvice))
      .where(where)
      .orderBy(desc(lostFixes.id))
      .limit(limit)
      .all();
  }
}
