import { pauseReasons } from '@hubtack/contracts/shifts/shift.js';
import { index, integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { instant } from './columns.js';
import { crews } from './crews.js';

/** A crew's shift as marked by the chief or the dispatcher; endAt null runs to now. */
export const shifts = sqliteTable(
  'shifts',
  {
    id: integer('id').primaryKey({ autoIncrement: true }),
    crewId: integer('crew_id')
      .notNull()
      .references(() => crews.id),
    startAt: instant('start_at').notNull(),
    endAt: instant('end_at'),
    /** Who marked it, by name; null for marks of the demo's past. */
    startedBy: text('started_by'),
    endedBy: text('ended_by'),
  },
  (table) => [
    // The shift marks of a crew on one local day.
    index('shifts_crew').on(table.crewId, table.startAt),
  ],
);

export const shiftPauses = sqliteTable(
  'shift_pauses',
  {
    id: integer('id').primaryKey({ autoIncrement: true }),
    shiftId: integer('shift_id')
      .notNull()
      .references(() => shifts.id, { onDelete: 'cascade' }),
    startAt: instant('start_at').notNull(),
    endAt: instant('end_at'),
    reason: text('reason', { enum: pauseReasons }).notNull(),
    markedBy: text('marked_by'),
  },
  (table) => [
    // The pauses of a shift.
    index('shift_pauses_shift').on(table.shiftId),
  ],
);
