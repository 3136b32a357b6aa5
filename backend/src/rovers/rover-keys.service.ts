import { Inject, Injectable } from '@nestjs/common';
import type { IssuedRoverKey, RoverKey } from '@hubtack/contracts/rovers/rover.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { roverKeys, rovers } from '@hubtack/drizzle/schema/rovers.js';
import { and, desc, eq, isNull } from 'drizzle-orm';
import { AuditService } from '../audit/audit.service.js';
import type { Viewer } from '../auth/access.js';
import { hashOfToken, newToken } from '../auth/tokens.js';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import { conflict, notFound } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';

/** Says what it is when it turns up in a file; the secret follows. */
const PREFIX = 'hub_';
const HINT_LENGTH = 9;
const iso = (time: number | null): string | null => (time === null ? null : new Date(time).toISOString());

@Injectable()
export class RoverKeysService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly audit: AuditService,
    private readonly changes: Changes,
    private readonly clock: Clock,
  ) {}

  list(roverId: number): RoverKey[] {
    this.rover(roverId);
    return this.database
      .select()
      .from(roverKeys)
      .where(eq(roverKeys.roverId, roverId))
      .orderBy(desc(roverKeys.id))
      .all()
      .map(({ id, hint, createdAt, lastUsedAt, revokedAt }) => ({
        id,
        hint,
        createdAt: iso(createdAt)!,
        lastUsedAt: iso(lastUsedAt),
        revokedAt: iso(revokedAt),
      }));
  }

  /** A new key beside those there are: old and new both work until the old one is taken back. */
  issue(viewer: Viewer, roverId: number): IssuedRoverKey {
    const key = `${PREFIX}${newToken()}`;
    const hint = key.slice(0, HINT_LENGTH);
    const id = this.database.transaction((tx) => {
      const rover = this.rover(roverId);
      if (rover.retired) throw conflict('This rover is retired. Bring it back into use first.');
      const row = tx
        .insert(roverKeys)
        .values({ roverId, keyHash: hashOfToken(key), hint, createdAt: this.clock.now() })
        .returning({ id: roverKeys.id })
        .get();
      this.audit.record(viewer, { action: 'roverKey.issued', subject: rover.label, after: { hint } });
      return row.id;
    });
    this.changes.announce({ kind: 'roverKeys', roverId });
    return { id, key };
  }

  revoke(viewer: Viewer, roverId: number, keyId: number): void {
    this.database.transaction((tx) => {
      const rover = this.rover(roverId);
      const row = tx
        .update(roverKeys)
        .set({ revokedAt: this.clock.now() })
        .where(and(eq(roverKeys.id, keyId), eq(roverKeys.roverId, roverId), isNull(roverKeys.revokedAt)))
        .returning({ hint: roverKeys.hint })
        .get();
      if (!row) throw notFound('This key');
      this.audit.record(viewer, {
        action: 'roverKey.revoked',
        subject: rover.label,
        before: { hint: row.hint },
      });
    });
    this.changes.announce({ kind: 'roverKeys', roverId });
  }

  private rover(id: number) {
    const rover = this.database.select().from(rovers).where(eq(rovers.id, id)).get();
    if (!rover) throw notFound('This rover');
    return rover;
  }
}
