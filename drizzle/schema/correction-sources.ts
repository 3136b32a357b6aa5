import type { CheckReport } from '@hubtack/contracts/corrections/check.js';
import { checkStatuses, checkStepNames } from '@hubtack/contracts/corrections/check.js';
import { correctionFormats } from '@hubtack/contracts/corrections/correction-source.js';
import { index, integer, real, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { flag, instant } from './columns.js';

export const correctionSources = sqliteTable('correction_sources', {
  id: integer('id').primaryKey({ autoIncrement: true }),
  name: text('name').notNull().unique(),
  address: text('address').notNull(),
  port: integer('port').notNull(),
  mountPoint: text('mount_point').notNull(),
  user: text('user'),
  /** AES-256-GCM under SECRETS_KEY; never leaves the server. */
  sealedPassword: text('sealed_password'),
  ntripVersion: integer('ntrip_version').$type<1 | 2>().notNull().default(2),
  tls: flag('tls').notNull().default(false),
  sendPosition: flag('send_position').notNull().default(false),
  expectedFormat: text('expected_format', { enum: correctionFormats }).notNull().default('any'),
  watchMinutes: integer('watch_minutes'),
  /** Where the base is said to be. */
  baseLatitude: real('base_latitude'),
  baseLongitude: real('base_longitude'),
  /** Where the newest message 1005 or 1006 of a check puts it; all null for a virtual base. */
  decodedAt: instant('decoded_at'),
  decodedStationId: integer('decoded_station_id'),
  decodedLatitude: real('decoded_latitude'),
  decodedLongitude: real('decoded_longitude'),
  decodedHeightM: real('decoded_height_m'),
  downSince: instant('down_since'),
  /** After a refused login nothing is asked again by itself until the login has been changed. */
  refusedAt: instant('refused_at'),
});

/** Checks of a source, kept for good: what was seen then is what a fault is compared with. */
export const correctionChecks = sqliteTable(
  'correction_checks',
  {
    id: integer('id').primaryKey({ autoIncrement: true }),
    sourceId: integer('source_id')
      .notNull()
      .references(() => correctionSources.id),
    startedAt: instant('started_at').notNull(),
    endedAt: instant('ended_at'),
    status: text('status', { enum: checkStatuses }).notNull(),
    /** Null: the timetable. */
    by: text('by'),
    place: text('place'),
    passed: flag('passed'),
    failedStep: text('failed_step', { enum: checkStepNames }),
    report: text('report', { mode: 'json' }).$type<CheckReport>().notNull(),
  },
  (table) => [
    // The checks of one source, newest first.
    index('correction_checks_source').on(table.sourceId, table.startedAt),
  ],
);
