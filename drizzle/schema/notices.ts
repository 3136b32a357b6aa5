import { noticeSubjects, noticeWays, type NoticeWay } from '@hubtack/contracts/notices/notice.js';
import { index, integer, primaryKey, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import { instant } from './columns.js';
import { lostFixes } from './lost-fixes.js';
import { users } from './users.js';

/** Rules that a person has set; one who has set none (no row in `notice_rule_owners`) has those of the role. */
export const noticeRules = sqliteTable(
  'notice_rules',
  {
    userId: integer('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    subject: text('subject', { enum: noticeSubjects }).notNull(),
    way: text('way', { enum: noticeWays }).notNull(),
    afterMinutes: integer('after_minutes').notNull(),
  },
  (table) => [primaryKey({ columns: [table.userId, table.subject, table.way] })],
);

export const noticeRuleOwners = sqliteTable('notice_rule_owners', {
  userId: integer('user_id')
    .primaryKey()
    .references(() => users.id, { onDelete: 'cascade' }),
});

/** What a person was told, once for each `dueKey` (a lost fix, a subject and a delay), whatever restarts in between. */
export const notices = sqliteTable(
  'notices',
  {
    id: integer('id').primaryKey({ autoIncrement: true }),
    userId: integer('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    lostFixId: integer('lost_fix_id')
      .notNull()
      .references(() => lostFixes.id),
    subject: text('subject', { enum: noticeSubjects }).notNull(),
    dueKey: text('due_key').notNull(),
    at: instant('at').notNull(),
    text: text('text').notNull(),
    ways: text('ways', { mode: 'json' }).$type<NoticeWay[]>().notNull(),
    seenAt: instant('seen_at'),
  },
  (table) => [
    // Once for each reason; and a person's newest notices.
    uniqueIndex('notices_due').on(table.userId, table.dueKey),
    index('notices_user').on(table.userId, table.id),
  ],
);
