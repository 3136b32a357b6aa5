import { Inject, Injectable } from '@nestjs/common';
import type { NearMountPoint } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { correctionSources } from '@hubtack/drizzle/schema/correction-sources.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { sites } from '@hubtack/drizzle/schema/sites.js';
import { eq } from 'drizzle-orm';
import { baseDistance } from '../common/base-distance.js';
import { DATABASE } from '../database/database.module.js';
import { basePlaceOf } from '../rovers/base-place.js';
import { FixesService } from '../fixes/fixes.service.js';
import { SettingsService } from '../settings/settings.service.js';
import { LostFixRepository } from './lost-fix.repository.js';
import type { LostFixRow } from './lost-fix.view.js';

const MOST = 6;

/** Mount points by distance from where a lost fix is: the rover's newest position, else its crew's site. */
@Injectable()
export class NearMountPoints {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly fixes: FixesService,
    private readonly settings: SettingsService,
    private readonly lostFixes: LostFixRepository,
  ) {}

  of(row: LostFixRow): NearMountPoint[] {
    const place =
      this.placeOf(row) ?? this.lostFixes.members(row.id).map((member) => this.placeOf(member))[0];
    if (!place) return [];
    const { maxBaselineKm } = this.settings.get().limits;
    return (
      this.database
        .select()
        .from(correctionSources)
        .all()
        // Another one that checks find down is no help.
        .filter(({ downSince, mountPoint }) => downSince === null || mountPoint === row.mountPoint)
        .flatMap(({ mountPoint, name, ...source }) => {
          const base = basePlaceOf(source);
          if (!base) return [];
          const distanceM = baseDistance(place.latitude, place.longitude, base.latitude, base.longitude);
          const isInRange = distanceM <= maxBaselineKm * 1000;
          return [{ mountPoint, name, distanceM, isOwn: mountPoint === row.mountPoint, isInRange }];
        })
        .toSorted((a, b) => a.distanceM - b.distanceM)
        .slice(0, MOST)
    );
  }

  private placeOf({ roverId, crewId }: LostFixRow): { latitude: number; longitude: number } | null {
    const latest = roverId === null ? null : this.fixes.latest(roverId);
    if (latest?.latitude != null && latest.longitude !== null)
      return { latitude: latest.latitude, longitude: latest.longitude };
    if (crewId === null) return null;
    const site = this.database
      .select({ latitude: sites.latitude, longitude: sites.longitude })
      .from(crews)
      .innerJoin(sites, eq(sites.id, crews.siteId))
      .where(eq(crews.id, crewId))
      .get();
    return site?.latitude == null || site.longitude == null
      ? null
      : { latitude: site.latitude, longitude: site.longitude };
  }
}
