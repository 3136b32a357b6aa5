import { integer, primaryKey, sqliteTable } from 'drizzle-orm/sqlite-core';
import { instant } from './columns.js';

/** Runs in which a rover was fixed within the tolerance profile, [start, end). Kept for good, as spans are: raw epochs go. */
export const toleranceSpans = sqliteTable(
  'tolerance_spans',
  {
    roverId: integer('rover_id').notNull(),
    start: instant('start_at').notNull(),
    end: instant('end_at').notNull(),
  },
  (table) => [primaryKey({ columns: [table.roverId, table.start] })],
);
