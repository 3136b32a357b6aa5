import { sqliteTable, text } from 'drizzle-orm/sqlite-core';

/** Local days on which no pattern counts. */
export const holidays = sqliteTable('holidays', {
  day: text('day').primaryKey(),
  name: text('name').notNull(),
});
