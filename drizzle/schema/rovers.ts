import { index, integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { flag, instant } from './columns.js';
import { correctionSources } from './correction-sources.js';
import { crews } from './crews.js';

export const rovers = sqliteTable('rovers', {
  id: integer('id').primaryKey({ autoIncrement: true }),
  label: text('label').notNull().unique(),
  receiver: text('receiver'),
  serial: text('serial'),
  correctionSourceId: integer('correction_source_id').references(() => correctionSources.id),
  retired: flag('retired').notNull().default(false),
});

/** SHA-256 of each key (256 random bits, so a fast hash is enough); several may work during a change-over. */
export const roverKeys = sqliteTable(
  'rover_keys',
  {
    id: integer('id').primaryKey({ autoIncrement: true }),
    roverId: integer('rover_id')
      .notNull()
      .references(() => rovers.id),
    keyHash: text('key_hash').notNull().unique(),
    hint: text('hint').notNull(),
    createdAt: instant('created_at').notNull(),
    lastUsedAt: instant('last_used_at'),
    revokedAt: instant('revoked_at'),
  },
  (table) => [
    // The keys of one rover, on its page.
    index('rover_keys_rover').on(table.roverId),
  ],
);

/** Which crew had a rover when: [startAt, endAt), endAt null is "still". */
export const roverAssignments = sqliteTable(
  'rover_assignments',
  {
    id: integer('id').primaryKey({ autoIncrement: true }),
    roverId: integer('rover_id')
      .notNull()
      .references(() => rovers.id),
    crewId: integer('crew_id')
      .notNull()
      .references(() => crews.id),
    startAt: instant('start_at').notNull(),
    endAt: instant('end_at'),
  },
  (table) => [
    // The crew of a rover at an instant.
    index('rover_assignments_rover').on(table.roverId, table.startAt),
    // The rovers of a crew over a day or a week.
    index('rover_assignments_crew').on(table.crewId, table.startAt),
  ],
);
