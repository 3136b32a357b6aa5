import { integer, primaryKey, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { instant } from './columns.js';

/**
 * Maximal runs of one fix state of one rover, [start, end), kept for good. Silence is what no row covers.
 * The newest row of a rover may lag behind its epochs by up to a minute (see `timeline.service.ts`).
 * WITHOUT ROWID by the migration: always read as a range of one rover.
 */
export const spans = sqliteTable(
  'spans',
  {
    roverId: integer('rover_id').notNull(),
    start: instant('start_at').notNull(),
    end: instant('end_at').notNull(),
    state: text('state', { enum: ['fixed', 'float', 'code', 'none'] }).notNull(),
  },
  (table) => [primaryKey({ columns: [table.roverId, table.start] })],
);
