import { Inject, Injectable } from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { rovers } from '@hubtack/drizzle/schema/rovers.js';
import { sites } from '@hubtack/drizzle/schema/sites.js';
import { eq } from 'drizzle-orm';
import { notFound, ProblemException } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';
import { FixesService } from '../fixes/fixes.service.js';

export interface Place {
  latitude: number;
  longitude: number;
  words: string;
}

/** Where work is done: what distances to a base count from. */
@Injectable()
export class Places {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly fixes: FixesService,
  ) {}

  /** Null when neither is named. Throws when it has no position. */
  of({ siteId, roverId }: { siteId?: number | undefined; roverId?: number | undefined }): Place | null {
    if (siteId !== undefined) return this.ofSite(siteId);
    return roverId === undefined ? null : this.ofRover(roverId);
  }

  private ofSite(id: number): Place {
    const site = this.database.select().from(sites).where(eq(sites.id, id)).get();
    if (!site) throw notFound('This site');
    const { latitude, longitude, name } = site;
    if (latitude === null || longitude === null) throw unplaced('/siteId', `${name} has no position.`);
    return { latitude, longitude, words: name };
  }

  private ofRover(id: number): Place {
    const rover = this.database.select().from(rovers).where(eq(rovers.id, id)).get();
    if (!rover) throw notFound('This rover');
    const latest = this.fixes.latest(id);
    if (latest?.latitude == null || latest.longitude === null)
      throw unplaced('/roverId', `${rover.label} has not said where it is.`);
    return { latitude: latest.latitude, longitude: latest.longitude, words: rover.label };
  }
}

const unplaced = (pointer: string, detail: string) =>
  new ProblemException(400, 'invalidBody', detail, { errors: [{ pointer, detail }] });
