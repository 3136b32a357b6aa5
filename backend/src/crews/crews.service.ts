import { Inject, Injectable } from '@nestjs/common';
import type { ChangeCrewBody, Crew, CrewBody } from '@hubtack/contracts/crews/crew.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { roverAssignments, rovers } from '@hubtack/drizzle/schema/rovers.js';
import { sites } from '@hubtack/drizzle/schema/sites.js';
import { and, asc, eq, gt, isNull, lte, or } from 'drizzle-orm';
import { AuditService } from '../audit/audit.service.js';
import type { Viewer } from '../auth/access.js';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import { forbidden, notFound, ProblemException } from '../common/problem.exception.js';
import { uniquely } from '../common/unique.js';
import { DATABASE } from '../database/database.module.js';

const NAME_TAKEN = 'There is a crew with this name already.';

@Injectable()
export class CrewsService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly audit: AuditService,
    private readonly changes: Changes,
    private readonly clock: Clock,
  ) {}

  /** All crews; for a crew chief only the own one. Rates are the manager's business. */
  list(viewer: Viewer): Crew[] {
    const now = this.clock.now();
    const current = this.database
      .select({ crewId: roverAssignments.crewId, id: rovers.id, label: rovers.label })
      .from(roverAssignments)
      .innerJoin(rovers, eq(rovers.id, roverAssignments.roverId))
      .where(
        and(
          eq(rovers.retired, false),
          lte(roverAssignments.startAt, now),
          or(isNull(roverAssignments.endAt), gt(roverAssignments.endAt, now)),
        ),
      )
      .orderBy(asc(rovers.label))
      .all();
    return this.database
      .select({ crew: crews, siteName: sites.name })
      .from(crews)
      .leftJoin(sites, eq(sites.id, crews.siteId))
      .orderBy(asc(crews.name))
      .all()
      .filter(({ crew }) => viewer.role !== 'crewChief' || crew.id === viewer.crewId)
      .map(({ crew, siteName }) => ({
        ...crew,
        hourlyRate: viewer.role === 'manager' ? crew.hourlyRate : null,
        siteName,
        rovers: current.filter(({ crewId }) => crewId === crew.id).map(({ id, label }) => ({ id, label })),
      }));
  }

  get(viewer: Viewer, id: number): Crew {
    const crew = this.list(viewer).find((candidate) => candidate.id === id);
    if (!crew) throw notFound('This crew');
    return crew;
  }

  add(viewer: Viewer, body: CrewBody): Crew {
    this.checkSite(body.siteId);
    if (viewer.role !== 'manager' && body.hourlyRate !== null) throw forbidden();
    const id = this.database.transaction((tx) => {
      const row = uniquely('/name', NAME_TAKEN, () => tx.insert(crews).values(body).returning().get());
      this.audit.record(viewer, { action: 'crew.added', subject: row.name, after: body });
      return row.id;
    });
    this.changes.announce({ kind: 'firm' });
    return this.get(viewer, id);
  }

  change(viewer: Viewer, id: number, body: ChangeCrewBody): Crew {
    this.checkSite(body.siteId);
    let isJudgedAnew = false;
    this.database.transaction((tx) => {
      const before = tx.select().from(crews).where(eq(crews.id, id)).get();
      if (!before) throw notFound('This crew');
      // Who may not see the rate sends none, and leaves it as it was.
      const hourlyRate = viewer.role === 'manager' ? body.hourlyRate : before.hourlyRate;
      const after = { ...body, hourlyRate };
      isJudgedAnew = before.toleranceProfile !== body.toleranceProfile;
      uniquely('/name', NAME_TAKEN, () => tx.update(crews).set(after).where(eq(crews.id, id)).run());
      this.audit.record(viewer, { action: 'crew.changed', subject: before.name, before, after });
    });
    if (isJudgedAnew) this.changes.announce({ kind: 'crewProfile', crewId: id });
    this.changes.announce({ kind: 'firm' });
    return this.get(viewer, id);
  }

  private checkSite(siteId: number | null): void {
    if (siteId === null) return;
    const site = this.database.select({ id: sites.id }).from(sites).where(eq(sites.id, siteId)).get();
    if (!site)
      throw new ProblemException(400, 'invalidBody', 'This site does not exist.', {
        errors: [{ pointer: '/siteId', detail: 'This site does not exist' }],
      });
  }
}
