import { integer, primaryKey, real, sqliteTable } from 'drizzle-orm/sqlite-core';
import { instant } from './columns.js';

/** Half a minute. Rovers that report together write to the same few pages, and a rover's hour is 120 look-ups. */
export const SLOT_MS = 30_000;

/**
 * Raw fix epochs, kept for RAW_EPOCH_DAYS. One per rover and time: a second one is a duplicate.
 *
 * The key is (slot, rover, time), slot = floor(time / SLOT_MS), and the migration makes the table WITHOUT ROWID:
 * see "Decisions" in DEVELOPERS.md. Ask slot by slot (`slot IN (...)`); no foreign key, because
 * this is the one hot insert and its rover has just been looked up by key.
 */
export const epochs = sqliteTable(
  'epochs',
  {
    slot: integer('slot').notNull(),
    roverId: integer('rover_id').notNull(),
    time: instant('time').notNull(),
    quality: integer('quality').notNull(),
    satellites: integer('satellites'),
    hdop: real('hdop'),
    ageMs: integer('age_ms'),
    stationId: integer('station_id'),
    latitude: real('latitude'),
    longitude: real('longitude'),
    altitudeM: real('altitude_m'),
    geoidSeparationM: real('geoid_separation_m'),
    sigmaLatitudeM: real('sigma_latitude_m'),
    sigmaLongitudeM: real('sigma_longitude_m'),
    sigmaAltitudeM: real('sigma_altitude_m'),
  },
  (table) => [primaryKey({ columns: [table.slot, table.roverId, table.time] })],
);
