import { Inject, Injectable } from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { passwordLinks } from '@hubtack/drizzle/schema/password-links.js';
import { and, eq, isNull } from 'drizzle-orm';
import { Clock } from '../common/clock.js';
import { ProblemException } from '../common/problem.exception.js';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import { DATABASE } from '../database/database.module.js';
import { publicUrlOf } from './public-url.js';
import { hashOfToken, newToken } from './tokens.js';

const HOUR = 3_600_000;
const lifetimeMs = { invite: 7 * 24 * HOUR, reset: HOUR, firstManager: 7 * 24 * HOUR } as const;

export type LinkPurpose = keyof typeof lifetimeMs;
export type PasswordLink = typeof passwordLinks.$inferSelect;

/** One-time links by which a password is set. */
@Injectable()
export class PasswordLinksService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    @Inject(ENVIRONMENT) private readonly environment: Environment,
    private readonly clock: Clock,
  ) {}

  /**
   * Makes a link; earlier ones of the same person and purpose stop working. An invitation outlives "forgot password",
   * which anybody may ask for in somebody else's name. Answers its address.
   */
  make(purpose: LinkPurpose, userId: number | null): string {
    const now = this.clock.now();
    const token = newToken();
    this.database.transaction((tx) => {
      const same = userId === null ? isNull(passwordLinks.userId) : eq(passwordLinks.userId, userId);
      tx.delete(passwordLinks)
        .where(and(same, eq(passwordLinks.purpose, purpose), isNull(passwordLinks.usedAt)))
        .run();
      tx.insert(passwordLinks)
        .values({
          tokenHash: hashOfToken(token),
          purpose,
          userId,
          createdAt: now,
          expiresAt: now + lifetimeMs[purpose],
        })
        .run();
    });
    return new URL(`/link/${token}`, publicUrlOf(this.environment)).href;
  }

  /** The link of a token; throws when it is unknown, used or too old. */
  find(token: string): PasswordLink {
    const link = this.database
      .select()
      .from(passwordLinks)
      .where(eq(passwordLinks.tokenHash, hashOfToken(token)))
      .get();
    if (!link || link.usedAt !== null || link.expiresAt <= this.clock.now())
      throw new ProblemException(
        410,
        'linkInvalid',
        'This link has been used or is too old. Ask for a new one.',
      );
    return link;
  }

  /** A link has done its work; other open ones of the same person have none left. */
  markUsed(link: PasswordLink): void {
    const same =
      link.userId === null
        ? eq(passwordLinks.tokenHash, link.tokenHash)
        : eq(passwordLinks.userId, link.userId);
    this.database
      .update(passwordLinks)
      .set({ usedAt: this.clock.now() })
      .where(and(same, isNull(passwordLinks.usedAt)))
      .run();
  }
}
