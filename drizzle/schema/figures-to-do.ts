import { integer, primaryKey, sqliteTable } from 'drizzle-orm/sqlite-core';
import { instant } from './columns.js';

/**
 * Stretches of a rover's time whose figures are to be worked out again: written in the transaction that changes the past, gone in the one
 * that has worked them out, so that nothing is forgotten by a restart.
 */
export const figuresToDo = sqliteTable(
  'figures_to_do',
  {
    roverId: integer('rover_id').notNull(),
    start: instant('start_at').notNull(),
    end: instant('end_at').notNull(),
  },
  (table) => [primaryKey({ columns: [table.roverId, table.start] })],
);
