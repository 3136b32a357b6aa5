import { Inject, Injectable } from '@nestjs/common';
import type { ChangeRoverBody, Rover, RoverBody } from '@hubtack/contracts/rovers/rover.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { correctionSources } from '@hubtack/drizzle/schema/correction-sources.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { roverAssignments, roverKeys, rovers } from '@hubtack/drizzle/schema/rovers.js';
import { and, asc, eq, gt, isNull, lte, or } from 'drizzle-orm';
import { AuditService } from '../audit/audit.service.js';
import type { Viewer } from '../auth/access.js';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import { notFound, ProblemException } from '../common/problem.exception.js';
import { uniquely } from '../common/unique.js';
import { DATABASE } from '../database/database.module.js';
import { FixesService } from '../fixes/fixes.service.js';

const LABEL_TAKEN = 'There is a rover with this label already.';

@Injectable()
export class RoversService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly fixes: FixesService,
    private readonly audit: AuditService,
    private readonly changes: Changes,
    private readonly clock: Clock,
  ) {}

  /** All rovers; for a crew chief only those that the own crew has now. */
  list(viewer: Viewer): Rover[] {
    const now = this.clock.now();
    const keys = this.database
      .select({ roverId: roverKeys.roverId })
      .from(roverKeys)
      .where(isNull(roverKeys.revokedAt))
      .all();
    return this.database
      .select({
        rover: rovers,
        mountPoint: correctionSources.mountPoint,
        crewId: crews.id,
        crewName: crews.name,
      })
      .from(rovers)
      .leftJoin(correctionSources, eq(correctionSources.id, rovers.correctionSourceId))
      .leftJoin(
        roverAssignments,
        and(
          eq(roverAssignments.roverId, rovers.id),
          lte(roverAssignments.startAt, now),
          or(isNull(roverAssignments.endAt), gt(roverAssignments.endAt, now)),
        ),
      )
      .leftJoin(crews, eq(crews.id, roverAssignments.crewId))
      .orderBy(asc(rovers.label))
      .all()
      .filter(({ crewId }) => viewer.role !== 'crewChief' || (crewId !== null && crewId === viewer.crewId))
      .map(({ rover, ...rest }) => {
        const heard = this.fixes.lastHeardAt(rover.id);
        return {
          ...rover,
          ...rest,
          activeKeys: keys.filter(({ roverId }) => roverId === rover.id).length,
          lastHeardAt: heard === null ? null : new Date(heard).toISOString(),
        };
      });
  }

  get(viewer: Viewer, id: number): Rover {
    const rover = this.list(viewer).find((candidate) => candidate.id === id);
    if (!rover) throw notFound('This rover');
    return rover;
  }

  add(viewer: Viewer, body: RoverBody): Rover {
    this.checkSource(body.correctionSourceId);
    const id = this.database.transaction((tx) => {
      const row = uniquely('/label', LABEL_TAKEN, () => tx.insert(rovers).values(body).returning().get());
      this.audit.record(viewer, { action: 'rover.added', subject: row.label, after: body });
      return row.id;
    });
    this.changes.announce({ kind: 'firm' });
    return this.get(viewer, id);
  }

  change(viewer: Viewer, id: number, body: ChangeRoverBody): Rover {
    this.checkSource(body.correctionSourceId);
    this.database.transaction((tx) => {
      const before = tx.select().from(rovers).where(eq(rovers.id, id)).get();
      if (!before) throw notFound('This rover');
      uniquely('/label', LABEL_TAKEN, () => tx.update(rovers).set(body).where(eq(rovers.id, id)).run());
      this.audit.record(viewer, { action: 'rover.changed', subject: before.label, before, after: body });
    });
    this.changes.announce({ kind: 'firm' });
    return this.get(viewer, id);
  }

  private checkSource(id: number | null): void {
    if (id === null) return;
    const source = this.database
      .select({ id: correctionSources.id })
      .from(correctionSources)
      .where(eq(correctionSources.id, id))
      .get();
    if (!source)
      throw new ProblemException(400, 'invalidBody', 'This correction source does not exist.', {
        errors: [{ pointer: '/correctionSourceId', detail: 'This correction source does not exist' }],
      });
  }
}
