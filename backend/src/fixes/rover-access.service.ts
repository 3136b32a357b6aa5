import { Inject, Injectable } from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { roverAssignments, rovers } from '@hubtack/drizzle/schema/rovers.js';
import { and, eq, gt, isNull, lte, or } from 'drizzle-orm';
import type { Viewer } from '../auth/access.js';
import { Clock } from '../common/clock.js';
import { notFound } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';

/** Which of a rover's past a person may see. */
@Injectable()
export class RoverAccessService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly clock: Clock,
  ) {}

  /**
   * Answers the first instant that the viewer may see: the whole past for the office, the time since it came to
   * the own crew for a crew chief. Any other rover does not exist for a crew chief.
   */
  visibleFrom(viewer: Viewer, roverId: number): number {
    const exists = this.database.select({ id: rovers.id }).from(rovers).where(eq(rovers.id, roverId)).get();
    if (!exists) throw notFound('This rover');
    if (viewer.role !== 'crewChief') return 0;
    const now = this.clock.now();
    const assignment = this.database
      .select({ crewId: roverAssignments.crewId, startAt: roverAssignments.startAt })
      .from(roverAssignments)
      .where(
        and(
          eq(roverAssignments.roverId, roverId),
          lte(roverAssignments.startAt, now),
          or(isNull(roverAssignments.endAt), gt(roverAssignments.endAt, now)),
        ),
      )
      .get();
    if (!assignment || assignment.crewId !== viewer.crewId) throw notFound('This rover');
    return assignment.startAt;
  }
}
