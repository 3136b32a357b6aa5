import type { CheckShotResult } from '@hubtack/contracts/set-up/check-shot.js';
import { index, integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { flag, instant } from './columns.js';
import { controlPoints } from './control-points.js';
import { crews } from './crews.js';
import { rovers } from './rovers.js';
import { setUpCards } from './set-up-cards.js';

/** Checks into control, kept for good with the values of the control point as they were. */
export const checkShots = sqliteTable(
  'check_shots',
  {
    id: integer('id').primaryKey({ autoIncrement: true }),
    roverId: integer('rover_id')
      .notNull()
      .references(() => rovers.id),
    crewId: integer('crew_id').references(() => crews.id),
    controlPointId: integer('control_point_id')
      .notNull()
      .references(() => controlPoints.id),
    controlPointName: text('control_point_name').notNull(),
    datum: text('datum'),
    setUpCardId: integer('set_up_card_id').references(() => setUpCards.id),
    at: instant('at').notNull(),
    by: text('by').notNull(),
    stationId: integer('station_id'),
    mountPoint: text('mount_point'),
    passed: flag('passed').notNull(),
    result: text('result', { mode: 'json' }).$type<CheckShotResult>().notNull(),
    note: text('note'),
  },
  (table) => [
    // The newest check shot of a rover, and those before it.
    index('check_shots_rover').on(table.roverId, table.at),
    // The check shots of a day.
    index('check_shots_at').on(table.at),
  ],
);
