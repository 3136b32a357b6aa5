import type { HeightKind } from '@hubtack/contracts/control-points/control-point.js';
import { integer, real, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { flag } from './columns.js';

export const controlPoints = sqliteTable('control_points', {
  id: integer('id').primaryKey({ autoIncrement: true }),
  name: text('name').notNull().unique(),
  latitude: real('latitude').notNull(),
  longitude: real('longitude').notNull(),
  height: real('height'),
  heightKind: text('height_kind').$type<HeightKind>().notNull(),
  datum: text('datum'),
  note: text('note'),
  active: flag('active').notNull().default(true),
});
