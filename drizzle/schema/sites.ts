import { integer, real, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { flag } from './columns.js';

export const sites = sqliteTable('sites', {
  id: integer('id').primaryKey({ autoIncrement: true }),
  name: text('name').notNull().unique(),
  latitude: real('latitude'),
  longitude: real('longitude'),
  note: text('note'),
  active: flag('active').notNull().default(true),
});
