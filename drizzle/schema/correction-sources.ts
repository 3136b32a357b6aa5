import { integer, real, sqliteTable, text } from 'drizzle-orm/sqlite-core';

export const correctionSources = sqliteTable('correction_sources', {
  id: integer('id').primaryKey({ autoIncrement: true }),
  name: text('name').notNull().unique(),
  address: text('address').notNull(),
  port: integer('port').notNull(),
  mountPoint: text('mount_point').notNull(),
  baseLatitude: real('base_latitude'),
  baseLongitude: real('base_longitude'),
});
