import type { Diagnosis } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { confirmedCauses } from '@hubtack/contracts/lost-fixes/cause.js';
import { endings, flagWords, historyKinds, lostFixKinds } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { sql } from 'drizzle-orm';
import { index, integer, sqliteTable, text, type AnySQLiteColumn } from 'drizzle-orm/sqlite-core';
import { flag, instant } from './columns.js';
import { crews } from './crews.js';
import { rovers } from './rovers.js';
import { users } from './users.js';

/** Lost fixes of every kind, kept for good: raised by the timeline, for a mount point, or by a chief's flag. */
export const lostFixes = sqliteTable(
  'lost_fixes',
  {
    id: integer('id').primaryKey({ autoIncrement: true }),
    kind: text('kind', { enum: lostFixKinds }).notNull(),
    roverId: integer('rover_id').references(() => rovers.id),
    crewId: integer('crew_id').references(() => crews.id),
    mountPoint: text('mount_point'),
    startAt: instant('start_at').notNull(),
    raisedAt: instant('raised_at').notNull(),
    endAt: instant('end_at'),
    ending: text('ending', { enum: endings }),
    pausedMs: integer('paused_ms').notNull().default(0),
    sharedId: integer('shared_id').references((): AnySQLiteColumn => lostFixes.id),
    flagAt: instant('flag_at'),
    flagWord: text('flag_word', { enum: flagWords }),
    flagNote: text('flag_note'),
    flagBy: text('flag_by'),
    takenAt: instant('taken_at'),
    takenByUserId: integer('taken_by_user_id').references(() => users.id),
    shelvedUntil: instant('shelved_until'),
    shelvedBy: text('shelved_by'),
    shelfReason: text('shelf_reason'),
    diagnosis: text('diagnosis', { mode: 'json' }).$type<Diagnosis>(),
    diagnosisAtRaising: text('diagnosis_at_raising', { mode: 'json' }).$type<Diagnosis>(),
    isChattering: flag('is_chattering').notNull().default(false),
    closedAt: instant('closed_at'),
    closedBy: text('closed_by'),
    confirmedCause: text('confirmed_cause', { enum: confirmedCauses }),
    closingNote: text('closing_note'),
  },
  (table) => [
    // The lost fixes of a rover over a shift; its history.
    index('lost_fixes_rover').on(table.roverId, table.startAt),
    // The history of a crew, and its day.
    index('lost_fixes_crew').on(table.crewId, table.startAt),
    // The lost fixes of a week.
    index('lost_fixes_start').on(table.startAt),
    // The history of a mount point.
    index('lost_fixes_mount_point').on(table.mountPoint, table.startAt),
    // What hangs under a mount point's lost fix.
    index('lost_fixes_shared').on(table.sharedId),
    // The desk: everything that nobody has closed; the board: what of it has not ended.
    index('lost_fixes_active')
      .on(table.endAt)
      .where(sql`closed_at IS NULL`),
  ],
);

/** What happened to a lost fix, in order; rows are only ever added. */
export const lostFixHistory = sqliteTable(
  'lost_fix_history',
  {
    id: integer('id').primaryKey({ autoIncrement: true }),
    lostFixId: integer('lost_fix_id')
      .notNull()
      .references(() => lostFixes.id),
    at: instant('at').notNull(),
    /** Null: the program itself. */
    by: text('by'),
    kind: text('kind', { enum: historyKinds }).notNull(),
    text: text('text').notNull(),
  },
  (table) => [
    // The history of one lost fix, and its newest advice.
    index('lost_fix_history_lost_fix').on(table.lostFixId, table.kind),
  ],
);

/** Photos lie as files in UPLOADS_DIR, resized and without metadata; `file` is the name there. */
export const lostFixPhotos = sqliteTable(
  'lost_fix_photos',
  {
    id: integer('id').primaryKey({ autoIncrement: true }),
    lostFixId: integer('lost_fix_id')
      .notNull()
      .references(() => lostFixes.id),
    at: instant('at').notNull(),
    by: text('by').notNull(),
    file: text('file').notNull().unique(),
    width: integer('width').notNull(),
    height: integer('height').notNull(),
  },
  (table) => [
    // The photos of one lost fix.
    index('lost_fix_photos_lost_fix').on(table.lostFixId),
  ],
);
