import { sql } from 'drizzle-orm';
import { index, integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { instant } from './columns.js';

/** Mails on their way. A row is written with what it tells of, in one transaction, and tried until the mail server takes it. */
export const outbox = sqliteTable(
  'outbox',
  {
    id: integer('id').primaryKey({ autoIncrement: true }),
    /** Why it goes out; a second one for the same reason is not put in. */
    reason: text('reason').notNull().unique(),
    to: text('to_address').notNull(),
    subject: text('subject').notNull(),
    text: text('text').notNull(),
    html: text('html'),
    createdAt: instant('created_at').notNull(),
    tries: integer('tries').notNull().default(0),
    nextTryAt: instant('next_try_at').notNull(),
    sentAt: instant('sent_at'),
    /** Given up: the mail server refuses it for good, or it is too old to be of use. */
    failedAt: instant('failed_at'),
    lastError: text('last_error'),
  },
  (table) => [
    // What is due to be tried.
    index('outbox_waiting')
      .on(table.nextTryAt)
      .where(sql`sent_at IS NULL AND failed_at IS NULL`),
  ],
);
