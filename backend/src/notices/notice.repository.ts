import { Inject, Injectable } from '@nestjs/common';
import { DAY_MS } from '@hubtack/contracts/nmea/sentence.js';
import type { Notice } from '@hubtack/contracts/notices/notice.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { lostFixHistory, lostFixes } from '@hubtack/drizzle/schema/lost-fixes.js';
import { notices } from '@hubtack/drizzle/schema/notices.js';
import { rovers } from '@hubtack/drizzle/schema/rovers.js';
import { and, desc, eq, gt, inArray, isNull, lte, or, sql } from 'drizzle-orm';
import { DATABASE } from '../database/database.module.js';
import type { PolicyLostFix } from './notice-tellings.js';
import type { NoticeFacts } from './notice-words.js';

/** A lost fix with all that decides about its notices, and goes into their words. */
export interface NoticeLostFix extends PolicyLostFix, NoticeFacts {
  advice: { id: number; at: number; text: string }[];
}

/** What has been over for this long is no news, although nobody has closed it. */
const OVER_MS = DAY_MS;
const NEWEST = 50;

@Injectable()
export class NoticeRepository {
  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {}

  /** Everything that may still be told of. */
  lostFixes(now: number): NoticeLostFix[] {
    const rows = this.database
      .select({ row: lostFixes, roverLabel: rovers.label, crewName: crews.name })
      .from(lostFixes)
      .leftJoin(rovers, eq(rovers.id, lostFixes.roverId))
      .leftJoin(crews, eq(crews.id, lostFixes.crewId))
      .where(and(isNull(lostFixes.closedAt), or(isNull(lostFixes.endAt), gt(lostFixes.endAt, now - OVER_MS))))
      .all();
    const history = this.history(rows.map(({ row }) => row.id));
    return rows.map(({ row, roverLabel, crewName }) => {
      const own = history.filter(({ lostFixId }) => lostFixId === row.id);
      const back = own.filter(({ kind }) => kind === 'backFromShelf').map(({ at }) => at);
      return {
        ...row,
        roverLabel,
        crewName,
        backAt: back.length === 0 ? null : Math.max(...back),
        advice: own.filter(({ kind }) => kind === 'advice'),
      };
    });
  }

  /** Due keys told so far about these lost fixes, by person. */
  told(userIds: readonly number[], lostFixIds: readonly number[]): Map<number, Set<string>> {
    const told = new Map(userIds.map((id) => [id, new Set<string>()]));
    // A due key begins with the lost fix and a space: a range of the index for each person and lost fix, however long the past is.
    const rows = this.database.all<{ userId: number; dueKey: string }>(sql`
      SELECT n.user_id AS userId, n.due_key AS dueKey
      FROM json_each(${JSON.stringify(userIds)}) AS u
      CROSS JOIN json_each(${JSON.stringify(lostFixIds)}) AS l
      CROSS JOIN ${notices} AS n ON n.user_id = u.value AND n.due_key > l.value || ' ' AND n.due_key < l.value || '!'`);
    for (const { userId, dueKey } of rows) told.get(userId)!.add(dueKey);
    return told;
  }

  /** Undefined when this person was told this before. */
  insert(values: typeof notices.$inferInsert): typeof notices.$inferSelect | undefined {
    return this.database
      .insert(notices)
      .values(values)
      .onConflictDoNothing({ target: [notices.userId, notices.dueKey] })
      .returning()
      .get();
  }

  newest(userId: number): Notice[] {
    return this.database
      .select({
        id: notices.id,
        at: notices.at,
        subject: notices.subject,
        kind: lostFixes.kind,
        lostFixId: notices.lostFixId,
        text: notices.text,
        ways: notices.ways,
        seenAt: notices.seenAt,
      })
      .from(notices)
      .innerJoin(lostFixes, eq(lostFixes.id, notices.lostFixId))
      .where(eq(notices.userId, userId))
      .orderBy(desc(notices.id))
      .limit(NEWEST)
      .all();
  }

  markSeen(userId: number, upTo: number, seenAt: number): void {
    this.database
      .update(notices)
      .set({ seenAt })
      .where(and(eq(notices.userId, userId), lte(notices.id, upTo), isNull(notices.seenAt)))
      .run();
  }

  private history(lostFixIds: readonly number[]) {
    const { id, lostFixId, at, kind, text } = lostFixHistory;
    return this.database
      .select({ id, lostFixId, at, kind, text })
      .from(lostFixHistory)
      .where(and(inArray(lostFixId, [...lostFixIds]), inArray(kind, ['advice', 'backFromShelf'])))
      .all();
  }
}
