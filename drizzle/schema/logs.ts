import { logStatuses, type LogDetail, type LogSummary } from '@hubtack/contracts/logs/log.js';
import { index, integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { instant } from './columns.js';
import { rovers } from './rovers.js';

/** Sentence logs that were uploaded, with what was read from them. The file itself goes once it has been read. */
export const logs = sqliteTable(
  'logs',
  {
    id: integer('id').primaryKey({ autoIncrement: true }),
    name: text('name').notNull(),
    bytes: integer('bytes').notNull(),
    at: instant('at').notNull(),
    by: text('by').notNull(),
    /** UTC date of the first sentence, when somebody said it. */
    date: text('date'),
    roverId: integer('rover_id').references(() => rovers.id),
    file: text('file'),
    status: text('status', { enum: logStatuses }).notNull(),
    problem: text('problem'),
    summary: text('summary', { mode: 'json' }).$type<LogSummary>(),
    detail: text('detail', { mode: 'json' }).$type<LogDetail>(),
  },
  (table) => [
    // The newest logs.
    index('logs_at').on(table.at),
  ],
);
