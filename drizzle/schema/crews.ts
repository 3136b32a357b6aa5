import type { ShiftPatternDay } from '@hubtack/contracts/crews/crew.js';
import { integer, real, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { flag } from './columns.js';
import { sites } from './sites.js';

export const crews = sqliteTable('crews', {
  id: integer('id').primaryKey({ autoIncrement: true }),
  name: text('name').notNull().unique(),
  phone: text('phone'),
  siteId: integer('site_id').references(() => sites.id),
  hourlyRate: real('hourly_rate'),
  /** Weekly pattern in the firm's zone; counts on days without shift marks. */
  pattern: text('pattern', { mode: 'json' }).$type<ShiftPatternDay[]>().notNull(),
  /** Name of its tolerance profile; null is the firm's. */
  toleranceProfile: text('tolerance_profile'),
  active: flag('active').notNull().default(true),
});
