import { Inject, Injectable } from '@nestjs/common';
import type { AssignRoverBody, RoverAssignment } from '@hubtack/contracts/rovers/rover.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { roverAssignments, rovers } from '@hubtack/drizzle/schema/rovers.js';
import { and, desc, eq, gt, isNull, or } from 'drizzle-orm';
import { AuditService } from '../audit/audit.service.js';
import type { Viewer } from '../auth/access.js';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import { conflict, notFound, ProblemException } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';

const iso = (time: number): string => new Date(time).toISOString();
const badStart = (detail: string) =>
  new ProblemException(400, 'invalidBody', detail, { errors: [{ pointer: '/startAt', detail }] });

/** Which crew had a rover when. A rover has one crew at any instant. */
@Injectable()
export class RoverAssignmentsService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly audit: AuditService,
    private readonly changes: Changes,
    private readonly clock: Clock,
  ) {}

  list(roverId: number): RoverAssignment[] {
    this.labelOf(roverId);
    return this.database
      .select({ assignment: roverAssignments, crewName: crews.name })
      .from(roverAssignments)
      .innerJoin(crews, eq(crews.id, roverAssignments.crewId))
      .where(eq(roverAssignments.roverId, roverId))
      .orderBy(desc(roverAssignments.startAt))
      .all()
      .map(({ assignment, crewName }) => ({
        id: assignment.id,
        roverId,
        crewId: assignment.crewId,
        crewName,
        startAt: iso(assignment.startAt),
        endAt: assignment.endAt === null ? null : iso(assignment.endAt),
      }));
  }

  /** From `startAt` (now when absent) on the rover is the crew's, or nobody's; the assignment before ends there. */
  assign(viewer: Viewer, roverId: number, body: AssignRoverBody): RoverAssignment[] {
    const now = this.clock.now();
    const startAt = body.startAt === undefined ? now : Date.parse(body.startAt);
    if (startAt > now) throw badStart('An assignment cannot start in the future.');
    this.database.transaction((tx) => {
      const label = this.labelOf(roverId);
      const crewName = this.crewNameOf(body.crewId);
      const reaching = tx
        .select()
        .from(roverAssignments)
        .where(
          and(
            eq(roverAssignments.roverId, roverId),
            or(isNull(roverAssignments.endAt), gt(roverAssignments.endAt, startAt)),
          ),
        )
        .all();
      const later = reaching.find((assignment) => assignment.startAt >= startAt);
      if (later)
        throw conflict(`From ${iso(later.startAt)} on the rover is assigned already. Choose a later start.`, [
          { pointer: '/startAt', detail: `Later than ${iso(later.startAt)}` },
        ]);
      const before = reaching.at(0);
      if (before && before.crewId === body.crewId) throw conflict('The rover is with this crew already.');
      if (before)
        tx.update(roverAssignments).set({ endAt: startAt }).where(eq(roverAssignments.id, before.id)).run();
      if (body.crewId !== null)
        tx.insert(roverAssignments).values({ roverId, crewId: body.crewId, startAt }).run();
      this.audit.record(viewer, {
        action: body.crewId === null ? 'rover.unassigned' : 'rover.assigned',
        subject: label,
        after: { crew: crewName, startAt: iso(startAt) },
      });
    });
    this.changes.announce({ kind: 'assignment', roverId, from: startAt });
    this.changes.announce({ kind: 'firm' });
    return this.list(roverId);
  }

  private labelOf(roverId: number): string {
    const rover = this.database
      .select({ label: rovers.label })
      .from(rovers)
      .where(eq(rovers.id, roverId))
      .get();
    if (!rover) throw notFound('This rover');
    return rover.label;
  }

  private crewNameOf(crewId: number | null): string | null {
    if (crewId === null) return null;
    const crew = this.database.select().from(crews).where(eq(crews.id, crewId)).get();
    if (!crew?.active)
      throw new ProblemException(400, 'invalidBody', 'This crew does not exist or is not in use.', {
        errors: [{ pointer: '/crewId', detail: 'This crew does not exist or is not in use' }],
      });
    return crew.name;
  }
}
