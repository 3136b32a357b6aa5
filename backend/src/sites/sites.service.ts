import { Inject, Injectable } from '@nestjs/common';
import type { ChangeSiteBody, Site, SiteBody } from '@hubtack/contracts/sites/site.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { sites } from '@hubtack/drizzle/schema/sites.js';
import { asc, eq } from 'drizzle-orm';
import { AuditService } from '../audit/audit.service.js';
import type { Viewer } from '../auth/access.js';
import { Changes } from '../common/changes.js';
import { notFound } from '../common/problem.exception.js';
import { uniquely } from '../common/unique.js';
import { DATABASE } from '../database/database.module.js';

const NAME_TAKEN = 'There is a site with this name already.';

@Injectable()
export class SitesService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly audit: AuditService,
    private readonly changes: Changes,
  ) {}

  /** All sites; for a crew chief only the own crew's. */
  list(viewer: Viewer): Site[] {
    const crewRows = this.database
      .select({ id: crews.id, name: crews.name, siteId: crews.siteId, active: crews.active })
      .from(crews)
      .all()
      .filter((crew) => viewer.role !== 'crewChief' || crew.id === viewer.crewId);
    const all = this.database.select().from(sites).orderBy(asc(sites.name)).all();
    return all
      .map((site) => ({
        ...site,
        crewNames: crewRows.filter((crew) => crew.active && crew.siteId === site.id).map(({ name }) => name),
      }))
      .filter((site) => viewer.role !== 'crewChief' || site.crewNames.length > 0);
  }

  get(viewer: Viewer, id: number): Site {
    const site = this.list(viewer).find((candidate) => candidate.id === id);
    if (!site) throw notFound('This site');
    return site;
  }

  add(viewer: Viewer, body: SiteBody): Site {
    const id = this.database.transaction((tx) => {
      const row = uniquely('/name', NAME_TAKEN, () => tx.insert(sites).values(body).returning().get());
      this.audit.record(viewer, { action: 'site.added', subject: row.name, after: body });
      return row.id;
    });
    this.changes.announce({ kind: 'firm' });
    return this.get(viewer, id);
  }

  change(viewer: Viewer, id: number, body: ChangeSiteBody): Site {
    this.database.transaction((tx) => {
      const before = tx.select().from(sites).where(eq(sites.id, id)).get();
      if (!before) throw notFound('This site');
      uniquely('/name', NAME_TAKEN, () => tx.update(sites).set(body).where(eq(sites.id, id)).run());
      this.audit.record(viewer, { action: 'site.changed', subject: before.name, before, after: body });
    });
    this.changes.announce({ kind: 'firm' });
    return this.get(viewer, id);
  }
}
