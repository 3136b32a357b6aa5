import { index, integer, primaryKey, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { instant } from './columns.js';

/**
 * Figures of each rover-shift, cut at local midnight so that days and weeks are sums of whole rows. Worked out from spans, marks, patterns
 * and assignments; made anew for a rover and a day as a whole.
 */
export const shiftFigures = sqliteTable(
  'shift_figures',
  {
    roverId: integer('rover_id').notNull(),
    /** Start of the shift that this is a part of. */
    shiftStart: instant('shift_start').notNull(),
    /** Local day, YYYY-MM-DD, and its ISO week. */
    day: text('day').notNull(),
    week: text('week').notNull(),
    crewId: integer('crew_id').notNull(),
    startAt: instant('start_at').notNull(),
    /** Null: the shift runs. */
    endAt: instant('end_at'),
    basis: text('basis', { enum: ['marks', 'pattern', 'noShiftSet'] }).notNull(),
    mountPoint: text('mount_point'),
    fixedMs: integer('fixed_ms').notNull(),
    floatMs: integer('float_ms').notNull(),
    codeMs: integer('code_ms').notNull(),
    noneMs: integer('none_ms').notNull(),
    silentMs: integer('silent_ms').notNull(),
    withinToleranceMs: integer('within_tolerance_ms').notNull(),
    /** From first report to first fix that holds; in the part in which the shift begins. Null: none. */
    firstFixMs: integer('first_fix_ms'),
    /** Lost fixes that start in this part. */
    lostFixes: integer('lost_fixes').notNull(),
    /** Lengths of those that have ended, ms. */
    regains: text('regains', { mode: 'json' }).$type<number[]>().notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.roverId, table.day, table.shiftStart, table.crewId] }),
    // The rows of a week.
    index('shift_figures_week').on(table.week),
  ],
);
