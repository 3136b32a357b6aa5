import { integer, primaryKey, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { users } from './users.js';

/** Who gets which sheet by mail. */
export const subscriptions = sqliteTable(
  'subscriptions',
  {
    userId: integer('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    sheet: text('sheet', { enum: ['weekly', 'daily'] }).notNull(),
  },
  (table) => [primaryKey({ columns: [table.userId, table.sheet] })],
);
