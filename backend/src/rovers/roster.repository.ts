import { Inject, Injectable } from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { correctionSources } from '@hubtack/drizzle/schema/correction-sources.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { roverAssignments, rovers } from '@hubtack/drizzle/schema/rovers.js';
import { sites } from '@hubtack/drizzle/schema/sites.js';
import { and, eq, gt, isNull, lte, or } from 'drizzle-orm';
import { DATABASE } from '../database/database.module.js';
import { basePlaceOf } from './base-place.js';

/** What a lane says that no sentence changes. */
export interface RosterEntry {
  roverId: number;
  roverLabel: string;
  crewId: number | null;
  crewName: string | null;
  crewPhone: string | null;
  siteName: string | null;
  mountPoint: string | null;
  baseLatitude: number | null;
  baseLongitude: number | null;
  /** Since when checks of its correction source find it down, ms UTC. */
  sourceDownSince: number | null;
  /** Since when this crew has the rover, ms UTC; null without a crew. */
  assignedAt: number | null;
}

@Injectable()
export class RosterRepository {
  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {}

  /** All rovers in use, with the crew that has them at this instant. */
  list(now: number): RosterEntry[] {
    const current = and(
      eq(roverAssignments.roverId, rovers.id),
      lte(roverAssignments.startAt, now),
      or(isNull(roverAssignments.endAt), gt(roverAssignments.endAt, now)),
    );
    return this.database
      .select({
        roverId: rovers.id,
        roverLabel: rovers.label,
        crewId: crews.id,
        crewName: crews.name,
        crewPhone: crews.phone,
        siteName: sites.name,
        mountPoint: correctionSources.mountPoint,
        baseLatitude: correctionSources.baseLatitude,
        baseLongitude: correctionSources.baseLongitude,
        decodedLatitude: correctionSources.decodedLatitude,
        decodedLongitude: correctionSources.decodedLongitude,
        sourceDownSince: correctionSources.downSince,
        assignedAt: roverAssignments.startAt,
      })
      .from(rovers)
      .leftJoin(roverAssignments, current)
      .leftJoin(crews, and(eq(crews.id, roverAssignments.crewId), eq(crews.active, true)))
      .leftJoin(sites, eq(sites.id, crews.siteId))
      .leftJoin(correctionSources, eq(correctionSources.id, rovers.correctionSourceId))
      .where(eq(rovers.retired, false))
      .all()
      .map(({ decodedLatitude, decodedLongitude, ...entry }) => {
        const place = basePlaceOf({ ...entry, decodedLatitude, decodedLongitude });
        return {
          ...entry,
          baseLatitude: place?.latitude ?? null,
          baseLongitude: place?.longitude ?? null,
        };
      });
  }

  /** The mount point that a rover takes its corrections from; null without one. */
  mountPointOf(roverId: number): string | null {
    const row = this.database
      .select({ mountPoint: correctionSources.mountPoint })
      .from(rovers)
      .innerJoin(correctionSources, eq(correctionSources.id, rovers.correctionSourceId))
      .where(eq(rovers.id, roverId))
      .get();
    return row?.mountPoint ?? null;
  }
}
