import { index, integer, primaryKey, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { instant } from './columns.js';
import { users } from './users.js';

/** Requests that a phone may send again because it did not get the answer, by their Idempotency-Key, with that answer. */
export const taps = sqliteTable(
  'taps',
  {
    userId: integer('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    key: text('key').notNull(),
    at: instant('at').notNull(),
    /** Method and path: the same key for something else is a fault of the client. */
    request: text('request').notNull(),
    answer: text('answer', { mode: 'json' }).$type<unknown>().notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.userId, table.key] }),
    // Retention lets old ones go.
    index('taps_at').on(table.at),
  ],
);
