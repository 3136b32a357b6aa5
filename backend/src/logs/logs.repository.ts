import { Inject, Injectable } from '@nestjs/common';
import type { Log, LogSummary, LogWithDetail } from '@hubtack/contracts/logs/log.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { logs } from '@hubtack/drizzle/schema/logs.js';
import { rovers } from '@hubtack/drizzle/schema/rovers.js';
import { asc, count, desc, eq, getTableColumns, inArray, isNotNull, sql } from 'drizzle-orm';
import { DATABASE } from '../database/database.module.js';

type LogRow = typeof logs.$inferSelect;

const LISTED = 50;
const { detail: _detail, summary: _summary, ...small } = getTableColumns(logs);

/** A list of fifty logs with thousands of changes each would be megabytes: it has the counts only. */
const summaryWithoutTransitions =
  sql<LogSummary | null>`json_set(${logs.summary}, '$.transitions', json('[]'),
  '$.moreTransitions', json_extract(${logs.summary}, '$.moreTransitions') + json_array_length(${logs.summary}, '$.transitions'))`.mapWith(
    (text: string) => JSON.parse(text) as LogSummary,
  );

/** A row without what was read. */
export type SmallLogRow = Omit<LogRow, 'detail' | 'summary'>;
const viewOf = (
  row: SmallLogRow,
  roverLabel: string | null,
  summary: LogSummary | null,
  progress: number,
): Log => ({
  id: row.id,
  name: row.name,
  bytes: row.bytes,
  at: new Date(row.at).toISOString(),
  by: row.by,
  roverId: row.roverId,
  roverLabel,
  status: row.status,
  progress: row.status === 'done' ? 1 : progress,
  problem: row.problem,
  summary,
});

@Injectable()
export class LogsRepository {
  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {}

  add(row: Omit<typeof logs.$inferInsert, 'id' | 'status'>): number {
    return this.database
      .insert(logs)
      .values({ ...row, status: 'waiting' })
      .returning({ id: logs.id })
      .get().id;
  }

  list(progressOf: (id: number) => number): Log[] {
    return this.database
      .select({ row: small, roverLabel: rovers.label, summary: summaryWithoutTransitions })
      .from(logs)
      .leftJoin(rovers, eq(rovers.id, logs.roverId))
      .orderBy(desc(logs.at), desc(logs.id))
      .limit(LISTED)
      .all()
      .map(({ row, roverLabel, summary }) => viewOf(row, roverLabel, summary, progressOf(row.id)));
  }

  get(id: number, progress: number): LogWithDetail | null {
    const found = this.database
      .select({ row: logs, roverLabel: rovers.label })
      .from(logs)
      .leftJoin(rovers, eq(rovers.id, logs.roverId))
      .where(eq(logs.id, id))
      .get();
    if (!found) return null;
    const { row, roverLabel } = found;
    return { ...viewOf(row, roverLabel, row.summary, progress), detail: row.detail };
  }

  row(id: number): SmallLogRow | null {
    return this.database.select(small).from(logs).where(eq(logs.id, id)).get() ?? null;
  }

  /** Those whose file is still needed, the oldest first. */
  unread(): SmallLogRow[] {
    return this.database
      .select(small)
      .from(logs)
      .where(inArray(logs.status, ['waiting', 'reading']))
      .orderBy(asc(logs.id))
      .all();
  }

  countUnread(): number {
    return this.database
      .select({ number: count() })
      .from(logs)
      .where(inArray(logs.status, ['waiting', 'reading']))
      .get()!.number;
  }

  /** Files that a row still names. */
  files(): Set<string> {
    const named = this.database.select({ file: logs.file }).from(logs).where(isNotNull(logs.file)).all();
    return new Set(named.map(({ file }) => file!));
  }

  change(id: number, change: Partial<Omit<LogRow, 'id'>>): void {
    this.database.update(logs).set(change).where(eq(logs.id, id)).run();
  }

  remove(id: number): void {
    this.database.delete(logs).where(eq(logs.id, id)).run();
  }
}
