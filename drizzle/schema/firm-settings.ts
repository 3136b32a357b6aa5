import { mondayToFriday, type ShiftPatternDay } from '@hubtack/contracts/crews/crew.js';
import { defaultLimits, type Limits } from '@hubtack/contracts/lost-fixes/limits.js';
import { defaultCheckShotLimits, type CheckShotLimits } from '@hubtack/contracts/set-up/check-shot-limits.js';
import { topographic, type ToleranceProfile } from '@hubtack/contracts/weekly/tolerance-profile.js';
import { integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { flag } from './columns.js';

/** One row, id 1: one firm per deployment. */
export const firmSettings = sqliteTable('firm_settings', {
  id: integer('id').primaryKey(),
  firmName: text('firm_name').notNull(),
  timeZone: text('time_zone').notNull(),
  units: text('units', { enum: ['metric', 'feet'] }).notNull(),
  currency: text('currency').notNull(),
  keepPositionsOffShift: flag('keep_positions_off_shift').notNull(),
  toleranceProfile: text('tolerance_profile', { mode: 'json' })
    .$type<ToleranceProfile>()
    .notNull()
    .default(topographic),
  otherProfiles: text('other_profiles', { mode: 'json' }).$type<ToleranceProfile[]>().notNull().default([]),
  checkShotLimits: text('check_shot_limits', { mode: 'json' })
    .$type<CheckShotLimits>()
    .notNull()
    .default(defaultCheckShotLimits),
  /** The pattern that a new crew begins with. */
  workingWeek: text('working_week', { mode: 'json' })
    .$type<ShiftPatternDay[]>()
    .notNull()
    .default(mondayToFriday),
  /** Local hour of Monday at which the week goes out by mail. */
  weeklyMailHour: integer('weekly_mail_hour').notNull().default(7),
  limits: text('limits', { mode: 'json' }).$type<Limits>().notNull().default(defaultLimits),
});
