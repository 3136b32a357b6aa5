import { Inject, Injectable } from '@nestjs/common';
import { auditEntries } from '@hubtack/drizzle/schema/audit-entries.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import type { Viewer } from '../auth/access.js';
import { Clock } from '../common/clock.js';
import { DATABASE } from '../database/database.module.js';

export interface AuditChange {
  /** subject.verb, such as `rover.assigned` */
  action: string;
  /** What was changed, in words */
  subject: string;
  before?: Record<string, unknown> | undefined;
  after?: Record<string, unknown> | undefined;
}

@Injectable()
export class AuditService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly clock: Clock,
  ) {}

  /** Call inside the transaction that makes the change, so that neither stands without the other. */
  record(actor: Pick<Viewer, 'userId' | 'name'> | null, change: AuditChange): void {
    this.database
      .insert(auditEntries)
      .values({
        at: this.clock.now(),
        actorUserId: actor?.userId ?? null,
        actorName: actor?.name ?? 'Hubtack',
        action: change.action,
        subject: change.subject,
        before: change.before ?? null,
        after: change.after ?? null,
      })
      .run();
  }
}
