import { Inject, Injectable } from '@nestjs/common';
import type {
  DisplayLink,
  DisplayLinkBody,
  IssuedDisplayLink,
} from '@hubtack/contracts/displays/display-link.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { displayLinks } from '@hubtack/drizzle/schema/display-links.js';
import { and, asc, eq, isNull } from 'drizzle-orm';
import { AuditService } from '../audit/audit.service.js';
import type { Viewer } from '../auth/access.js';
import { SessionService, type IssuedSession } from '../auth/session.service.js';
import { hashOfToken, newToken } from '../auth/tokens.js';
import { Clock } from '../common/clock.js';
import { notFound, ProblemException } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';

const iso = (time: number | null): string | null => (time === null ? null : new Date(time).toISOString());

/** Read-only boards for screens on the wall. */
@Injectable()
export class DisplaysService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly sessions: SessionService,
    private readonly audit: AuditService,
    private readonly clock: Clock,
  ) {}

  list(): DisplayLink[] {
    return this.database
      .select()
      .from(displayLinks)
      .where(isNull(displayLinks.revokedAt))
      .orderBy(asc(displayLinks.name))
      .all()
      .map(({ id, name, createdAt, lastOpenedAt }) => ({
        id,
        name,
        createdAt: iso(createdAt)!,
        lastOpenedAt: iso(lastOpenedAt),
      }));
  }

  make(viewer: Viewer, body: DisplayLinkBody): IssuedDisplayLink {
    const token = newToken();
    const id = this.database.transaction((tx) => {
      const row = tx
        .insert(displayLinks)
        .values({ name: body.name, tokenHash: hashOfToken(token), createdAt: this.clock.now() })
        .returning({ id: displayLinks.id })
        .get();
      this.audit.record(viewer, { action: 'display.made', subject: body.name });
      return row.id;
    });
    return { id, token };
  }

  revoke(viewer: Viewer, id: number): void {
    this.database.transaction((tx) => {
      const row = tx
        .update(displayLinks)
        .set({ revokedAt: this.clock.now() })
        .where(and(eq(displayLinks.id, id), isNull(displayLinks.revokedAt)))
        .returning()
        .get();
      if (!row) throw notFound('This display');
      this.audit.record(viewer, { action: 'display.revoked', subject: row.name });
    });
    this.sessions.end(this.sessions.openOf({ displayLinkId: id }), 'linkRevoked');
  }

  /** Signs a screen in by its link. */
  open(token: string): IssuedSession {
    const row = this.database
      .update(displayLinks)
      .set({ lastOpenedAt: this.clock.now() })
      .where(and(eq(displayLinks.tokenHash, hashOfToken(token)), isNull(displayLinks.revokedAt)))
      .returning({ id: displayLinks.id })
      .get();
    if (!row) throw new ProblemException(410, 'linkInvalid', 'This display link has been taken back.');
    return this.sessions.start({ displayLinkId: row.id });
  }
}
