import { randomUUID } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { displayLinks } from '@hubtack/drizzle/schema/display-links.js';
import { refreshTokens, signInSessions } from '@hubtack/drizzle/schema/sign-in-sessions.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import { and, eq, gte, isNotNull, isNull, lt, ne } from 'drizzle-orm';
import { AuditService } from '../audit/audit.service.js';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import { ProblemException } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';
import type { Viewer } from './access.js';
import { hashOfToken, newToken } from './tokens.js';

const HOUR = 3_600_000;
const DAY = 24 * HOUR;
/** A person's sign-in ends after this long without use, and in any case after a week. A display lasts a year. */
const IDLE_MS = 12 * HOUR;
const WHOLE_MS = 7 * DAY;
const DISPLAY_MS = 365 * DAY;
/**
 * Two tabs may refresh at the same moment with the same token, and an answer may be lost on a poor mobile link: within
 * this time, and only until what was given for the token has been used itself, a second use is no theft.
 */
const REUSE_GRACE_MS = 10_000;
/** Used tokens are kept this long to notice theft; a display's would otherwise add up to tens of thousands. */
const USED_KEPT_MS = 30 * DAY;

export type EndReason = 'signOut' | 'tokenReused' | 'accountChanged' | 'linkRevoked';

export interface IssuedSession {
  sessionId: string;
  refreshToken: string;
  endsAt: number;
}

const ended = (detail = 'This sign-in has ended. Sign in again.') =>
  new ProblemException(401, 'signInEnded', detail);

/** Sign-ins and the refresh tokens that descend from them. */
@Injectable()
export class SessionService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly clock: Clock,
    private readonly changes: Changes,
    private readonly audit: AuditService,
  ) {}

  start(owner: { userId: number } | { displayLinkId: number }): IssuedSession {
    const now = this.clock.now();
    const isDisplay = 'displayLinkId' in owner;
    const endsAt = now + (isDisplay ? DISPLAY_MS : IDLE_MS);
    const sessionId = randomUUID();
    return this.database.transaction((tx) => {
      tx.insert(signInSessions)
        .values({ id: sessionId, ...owner, createdAt: now, expiresAt: endsAt })
        .run();
      return { sessionId, refreshToken: this.issueToken(sessionId, now), endsAt };
    });
  }

  /** Gives a new refresh token for a used-up one. A token that was used before shows theft: the sign-in ends. */
  refresh(token: string): IssuedSession {
    const now = this.clock.now();
    const tokenHash = hashOfToken(token);
    const row = this.database
      .select({ token: refreshTokens, session: signInSessions })
      .from(refreshTokens)
      .innerJoin(signInSessions, eq(signInSessions.id, refreshTokens.sessionId))
      .where(eq(refreshTokens.tokenHash, tokenHash))
      .get();
    if (!row || row.session.endedAt !== null || row.session.expiresAt <= now) throw ended();
    const { usedAt, sessionId } = row.token;
    if (usedAt !== null && (now - usedAt > REUSE_GRACE_MS || this.hasGoneOn(row.token, usedAt))) {
      this.endAsStolen(sessionId);
      throw new ProblemException(
        401,
        'tokenReused',
        'This sign-in was used from two places and has been ended. Sign in again.',
      );
    }
    const { createdAt, displayLinkId } = row.session;
    const endsAt =
      displayLinkId === null ? Math.min(createdAt + WHOLE_MS, now + IDLE_MS) : row.session.expiresAt;
    return this.database.transaction((tx) => {
      if (usedAt === null)
        tx.update(refreshTokens).set({ usedAt: now }).where(eq(refreshTokens.tokenHash, tokenHash)).run();
      tx.update(signInSessions).set({ expiresAt: endsAt }).where(eq(signInSessions.id, sessionId)).run();
      tx.delete(refreshTokens)
        .where(and(eq(refreshTokens.sessionId, sessionId), lt(refreshTokens.usedAt, now - USED_KEPT_MS)))
        .run();
      return { sessionId, refreshToken: this.issueToken(sessionId, now), endsAt };
    });
  }

  /** Who a sign-in stands for right now: role and crew as they are in the database, not as they were at signing in. */
  viewer(sessionId: string): Viewer {
    const row = this.database
      .select({ session: signInSessions, user: users, display: displayLinks })
      .from(signInSessions)
      .leftJoin(users, eq(users.id, signInSessions.userId))
      .leftJoin(displayLinks, eq(displayLinks.id, signInSessions.displayLinkId))
      .where(eq(signInSessions.id, sessionId))
      .get();
    if (!row || row.session.endedAt !== null || row.session.expiresAt <= this.clock.now()) throw ended();
    const common = { sessionId, signInEndsAt: row.session.expiresAt };
    if (row.user?.active)
      return {
        ...common,
        userId: row.user.id,
        name: row.user.name,
        role: row.user.role,
        crewId: row.user.crewId,
      };
    if (row.display && row.display.revokedAt === null)
      return { ...common, userId: null, name: row.display.name, role: 'display', crewId: null };
    throw ended();
  }

  /** The sign-in that a refresh token belongs to, used or not; null for an unknown one. */
  idOf(refreshToken: string): string | null {
    const row = this.database
      .select({ sessionId: refreshTokens.sessionId })
      .from(refreshTokens)
      .where(eq(refreshTokens.tokenHash, hashOfToken(refreshToken)))
      .get();
    return row?.sessionId ?? null;
  }

  end(sessionIds: readonly string[], reason: EndReason): void {
    for (const id of sessionIds) {
      this.database
        .update(signInSessions)
        .set({ endedAt: this.clock.now(), endReason: reason })
        .where(and(eq(signInSessions.id, id), isNull(signInSessions.endedAt)))
        .run();
    }
    this.lookAnew(sessionIds);
  }

  /** What these sign-ins may see has changed: their streams end and come back as what they are now. */
  lookAnew(sessionIds: readonly string[]): void {
    if (sessionIds.length > 0) this.changes.announce({ kind: 'sessions', sessionIds: [...sessionIds] });
  }

  /** Sign-ins of a person, or of a display, that have not ended. */
  openOf(owner: { userId: number } | { displayLinkId: number }): string[] {
    const mine =
      'userId' in owner
        ? eq(signInSessions.userId, owner.userId)
        : eq(signInSessions.displayLinkId, owner.displayLinkId);
    return this.database
      .select({ id: signInSessions.id })
      .from(signInSessions)
      .where(and(mine, isNull(signInSessions.endedAt)))
      .all()
      .map(({ id }) => id);
  }

  /** Whether a token given since this one was used has been used in its turn. */
  private hasGoneOn(token: typeof refreshTokens.$inferSelect, usedAt: number): boolean {
    const later = this.database
      .select({ usedAt: refreshTokens.usedAt })
      .from(refreshTokens)
      .where(
        and(
          eq(refreshTokens.sessionId, token.sessionId),
          ne(refreshTokens.tokenHash, token.tokenHash),
          gte(refreshTokens.issuedAt, usedAt),
          isNotNull(refreshTokens.usedAt),
        ),
      )
      .limit(1)
      .get();
    return later !== undefined;
  }

  private endAsStolen(sessionId: string): void {
    const viewer = this.viewer(sessionId);
    this.audit.record(null, { action: 'signIn.tokenReused', subject: viewer.name });
    this.end([sessionId], 'tokenReused');
  }

  private issueToken(sessionId: string, now: number): string {
    const token = newToken();
    this.database
      .insert(refreshTokens)
      .values({ tokenHash: hashOfToken(token), sessionId, issuedAt: now })
      .run();
    return token;
  }
}
