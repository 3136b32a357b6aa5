import { Inject, Injectable } from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { epochs, SLOT_MS } from '@hubtack/drizzle/schema/epochs.js';
import { and, eq, gte, inArray, isNotNull, lt, sql } from 'drizzle-orm';
import { DATABASE } from '../database/database.module.js';
import type { Epoch, LateSigmas } from './epoch.js';
import type { TimedQuality } from './timeline.js';

export const slotOf = (time: number): number => Math.floor(time / SLOT_MS);

const slotsBetween = (from: number, to: number): number[] => {
  const first = slotOf(from);
  return Array.from({ length: slotOf(to - 1) - first + 1 }, (_, index) => first + index);
};

/** Slots asked for in one statement; bounds the list that SQLite is given. */
const SLOTS_AT_ONCE = 500;

@Injectable()
export class EpochRepository {
  /**
   * The one hot insert, prepared once on Drizzle's own client (0.99 of the bare rate; see "Decisions").
   * ON CONFLICT DO NOTHING and not OR IGNORE, which would also swallow faults such as NOT NULL.
   */
  private readonly insertStatement;

  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {
    this.insertStatement = database.$client.prepare(
      `INSERT INTO epochs (slot, rover_id, time, quality, satellites, hdop, age_ms, station_id, latitude, longitude,
         altitude_m, geoid_separation_m, sigma_latitude_m, sigma_longitude_m, sigma_altitude_m)
       VALUES (?,?,?,?,?,?,?,?,?,?,?,?,?,?,?) ON CONFLICT DO NOTHING`,
    );
  }

  /** Answers false when the rover has an epoch at this time already: the first received stays. */
  insert(roverId: number, epoch: Epoch): boolean {
    const result = this.insertStatement.run(
      slotOf(epoch.time),
      roverId,
      epoch.time,
      epoch.quality,
      epoch.satellites,
      epoch.hdop,
      epoch.ageMs,
      epoch.stationId,
      epoch.latitude,
      epoch.longitude,
      epoch.altitudeM,
      epoch.geoidSeparationM,
      epoch.sigmaLatitudeM,
      epoch.sigmaLongitudeM,
      epoch.sigmaAltitudeM,
    );
    return result.changes === 1;
  }

  addSigmas(roverId: number, sigmas: LateSigmas): void {
    const { time, ...values } = sigmas;
    this.database
      .update(epochs)
      .set(values)
      .where(and(eq(epochs.slot, slotOf(time)), eq(epochs.roverId, roverId), eq(epochs.time, time)))
      .run();
  }

  /** Times and qualities of one rover in [from, to), in order of time. Asked slot by slot, never a scan. */
  qualities(roverId: number, from: number, to: number): TimedQuality[] {
    return this.bySlots(from, to, (slots) =>
      this.database
        .select({ time: epochs.time, quality: epochs.quality })
        .from(epochs)
        .where(this.window(roverId, slots, from, to))
        .orderBy(epochs.slot, epochs.time)
        .all(),
    );
  }

  /** What tolerance is judged by, of one rover in [from, to), in order of time: a third of what whole epochs cost, and days of it are read. */
  judged(
    roverId: number,
    from: number,
    to: number,
  ): Pick<Epoch, 'time' | 'quality' | 'ageMs' | 'hdop' | 'satellites'>[] {
    const { time, quality, ageMs, hdop, satellites } = epochs;
    return this.bySlots(from, to, (slots) =>
      this.database
        .select({ time, quality, ageMs, hdop, satellites })
        .from(epochs)
        .where(this.window(roverId, slots, from, to))
        .orderBy(epochs.slot, epochs.time)
        .all(),
    );
  }

  /** Whole epochs of one rover in [from, to), in order of time. */
  list(roverId: number, from: number, to: number): Epoch[] {
    return this.bySlots(from, to, (slots) =>
      this.database
        .select()
        .from(epochs)
        .where(this.window(roverId, slots, from, to))
        .orderBy(epochs.slot, epochs.time)
        .all()
        .map(({ slot: _slot, roverId: _roverId, ...epoch }) => epoch),
    );
  }

  /** One place of a rover for each slot of [from, to) that has any, in order of time. */
  places(roverId: number, from: number, to: number): { time: number; latitude: number; longitude: number }[] {
    return this.bySlots(from, to, (slots) =>
      this.database
        .select({
          // SQLite takes the other columns from the row that has the minimum.
          time: sql<number>`min(${epochs.time})`,
          latitude: sql<number>`${epochs.latitude}`,
          longitude: sql<number>`${epochs.longitude}`,
        })
        .from(epochs)
        .where(
          and(this.window(roverId, slots, from, to), isNotNull(epochs.latitude), isNotNull(epochs.longitude)),
        )
        .groupBy(epochs.slot)
        .orderBy(epochs.slot)
        .all(),
    );
  }

  private window(roverId: number, slots: number[], from: number, to: number) {
    return and(
      inArray(epochs.slot, sql`(SELECT value FROM json_each(${JSON.stringify(slots)}))`),
      eq(epochs.roverId, roverId),
      gte(epochs.time, from),
      lt(epochs.time, to),
    );
  }

  private bySlots<T>(from: number, to: number, read: (slots: number[]) => T[]): T[] {
    const slots = slotsBetween(from, to);
    const rows: T[] = [];
    for (let at = 0; at < slots.length; at += SLOTS_AT_ONCE) {
      for (const row of read(slots.slice(at, at + SLOTS_AT_ONCE))) rows.push(row);
    }
    return rows;
  }
}
