import { defaultLimits, type Limits } from '@hubtack/contracts/lost-fixes/limits.js';
import { integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { flag } from './columns.js';

/** One row, id 1: one firm per deployment. */
export const firmSettings = sqliteTable('firm_settings', {
  id: integer('id').primaryKey(),
  firmName: text('firm_name').notNull(),
  timeZone: text('time_zone').notNull(),
  units: text('units', { enum: ['metric', 'feet'] }).notNull(),
  currency: text('currency').notNull(),
  keepPositionsOffShift: flag('keep_positions_off_shift').notNull(),
  limits: text('limits', { mode: 'json' }).$type<Limits>().notNull().default(defaultLimits),
});
