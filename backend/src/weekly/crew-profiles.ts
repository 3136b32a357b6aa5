import { Inject, Injectable } from '@nestjs/common';
import { profileOf, type Profiles } from '@hubtack/contracts/weekly/tolerance-profile.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { DATABASE } from '../database/database.module.js';
import type { ProfileOfCrew } from './tolerance.js';

/** Which tolerance profile the work of each crew is judged by. */
@Injectable()
export class CrewProfiles {
  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {}

  of(profiles: Profiles): ProfileOfCrew {
    const rows = this.database.select({ id: crews.id, name: crews.toleranceProfile }).from(crews).all();
    const names = new Map(rows.map(({ id, name }) => [id, name]));
    return (crewId) => profileOf(profiles, crewId === null ? null : (names.get(crewId) ?? null));
  }
}
