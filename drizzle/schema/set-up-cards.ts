import { correctionFormats } from '@hubtack/contracts/corrections/correction-source.js';
import { measuringPoints, tiltStates, type SetUpDoubt } from '@hubtack/contracts/set-up/set-up-card.js';
import { index, integer, real, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { instant } from './columns.js';
import { correctionSources } from './correction-sources.js';
import { crews } from './crews.js';
import { rovers } from './rovers.js';

/** How a rover was set up, as somebody vouched for it; rows are only ever added. */
export const setUpCards = sqliteTable(
  'set_up_cards',
  {
    id: integer('id').primaryKey({ autoIncrement: true }),
    roverId: integer('rover_id')
      .notNull()
      .references(() => rovers.id),
    /** Whose the rover was at that instant. */
    crewId: integer('crew_id').references(() => crews.id),
    at: instant('at').notNull(),
    by: text('by').notNull(),
    poleHeightM: real('pole_height_m').notNull(),
    measuringPoint: text('measuring_point', { enum: measuringPoints }).notNull(),
    antennaOffsetM: real('antenna_offset_m').notNull(),
    tilt: text('tilt', { enum: tiltStates }).notNull(),
    correctionSourceId: integer('correction_source_id').references(() => correctionSources.id),
    messageFormat: text('message_format', { enum: correctionFormats }).notNull(),
    toleranceProfile: text('tolerance_profile'),
    checkedBy: text('checked_by').notNull(),
    note: text('note'),
    confirmed: text('confirmed', { mode: 'json' }).$type<SetUpDoubt[]>().notNull(),
  },
  (table) => [
    // The newest card of a rover, and those before it.
    index('set_up_cards_rover').on(table.roverId, table.at),
  ],
);
