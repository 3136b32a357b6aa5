import { Inject, Injectable } from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { correctionChecks, correctionSources } from '@hubtack/drizzle/schema/correction-sources.js';
import { and, asc, desc, eq, isNotNull, sql } from 'drizzle-orm';
import { DATABASE } from '../database/database.module.js';
import type { CheckRow, SourceRow } from './correction-source.view.js';

const HISTORY = 50;

@Injectable()
export class CorrectionSourcesRepository {
  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {}

  list(): SourceRow[] {
    return this.database.select().from(correctionSources).orderBy(asc(correctionSources.name)).all();
  }

  row(id: number): SourceRow | undefined {
    return this.database.select().from(correctionSources).where(eq(correctionSources.id, id)).get();
  }

  insert(values: typeof correctionSources.$inferInsert): SourceRow {
    return this.database.insert(correctionSources).values(values).returning().get();
  }

  update(id: number, values: Partial<typeof correctionSources.$inferInsert>): SourceRow {
    return this.database
      .update(correctionSources)
      .set(values)
      .where(eq(correctionSources.id, id))
      .returning()
      .get();
  }

  /** Those that are checked on a timetable. */
  watched(): SourceRow[] {
    return this.database
      .select()
      .from(correctionSources)
      .where(isNotNull(correctionSources.watchMinutes))
      .all();
  }

  /** The newest check of each source, by its id. */
  lastChecks(): Map<number, CheckRow> {
    const newest = this.database
      .select({ id: sql<number>`max(${correctionChecks.id})` })
      .from(correctionChecks)
      .groupBy(correctionChecks.sourceId);
    const rows = this.database
      .select()
      .from(correctionChecks)
      .where(sql`${correctionChecks.id} IN ${newest}`)
      .all();
    return new Map(rows.map((row) => [row.sourceId, row]));
  }

  /** Newest first. */
  checks(sourceId: number, most = HISTORY): CheckRow[] {
    return this.database
      .select()
      .from(correctionChecks)
      .where(eq(correctionChecks.sourceId, sourceId))
      .orderBy(desc(correctionChecks.startedAt), desc(correctionChecks.id))
      .limit(most)
      .all();
  }

  check(sourceId: number, id: number): CheckRow | undefined {
    return this.database
      .select()
      .from(correctionChecks)
      .where(and(eq(correctionChecks.id, id), eq(correctionChecks.sourceId, sourceId)))
      .get();
  }

  hasEverPassed(sourceId: number): boolean {
    const row = this.database
      .select({ id: correctionChecks.id })
      .from(correctionChecks)
      .where(and(eq(correctionChecks.sourceId, sourceId), eq(correctionChecks.passed, true)))
      .limit(1)
      .get();
    return row !== undefined;
  }

  insertCheck(values: typeof correctionChecks.$inferInsert): CheckRow {
    return this.database.insert(correctionChecks).values(values).returning().get();
  }

  updateCheck(id: number, values: Partial<typeof correctionChecks.$inferInsert>): void {
    this.database.update(correctionChecks).set(values).where(eq(correctionChecks.id, id)).run();
  }

  /** Checks that a stop of the server has cut off. */
  cutOff(now: number): void {
    this.database
      .update(correctionChecks)
      .set({ status: 'cancelled', endedAt: now })
      .where(eq(correctionChecks.status, 'running'))
      .run();
  }
}
