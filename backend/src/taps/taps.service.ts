import { Inject, Injectable } from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { taps } from '@hubtack/drizzle/schema/taps.js';
import { and, eq, sql } from 'drizzle-orm';
import type { Viewer } from '../auth/access.js';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import { conflict, ProblemException } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';

const KEY = /^[\x21-\x7e]{1,100}$/;

/**
 * A phone that did not get its answer sends again, with the same Idempotency-Key (IETF draft "The Idempotency-Key HTTP Header
 * Field"): the first answer comes again, and nothing happens twice. What is refused is not remembered.
 */
@Injectable()
export class TapsService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly changes: Changes,
    private readonly clock: Clock,
  ) {}

  /**
   * Runs `effect` and keeps its answer in one transaction, or gives the answer of the first time. `request`: method and path. Without a key it
   * just runs. Throws 400 for a key that cannot be one, 409 for a key that was used for something else.
   */
  once<T>(viewer: Viewer, key: string | undefined, request: string, effect: () => T): T {
    if (key === undefined) return this.changes.onceItHolds(() => this.database.transaction(effect));
    return this.changes.onceItHolds(() => this.keep(viewer, key, request, effect));
  }

  private keep<T>(viewer: Viewer, key: string, request: string, effect: () => T): T {
    return this.database.transaction((tx) => {
      const known = this.answered<T>(viewer, key, request);
      if (known) return known.answer;
      const answer = effect();
      // Drizzle would write an answer that is null as SQL's NULL, not as JSON's.
      const kept = sql`${JSON.stringify(answer ?? null)}`;
      tx.insert(taps)
        .values({ userId: viewer.userId!, key, at: this.clock.now(), request, answer: kept })
        .run();
      return answer;
    });
  }

  /** The answer of the first time, if there was one. For effects that cannot run inside a transaction. */
  answered<T>(viewer: Viewer, key: string, request: string): { answer: T } | null {
    if (!KEY.test(key))
      throw new ProblemException(400, 'badRequest', 'Idempotency-Key: 1 to 100 printable characters.');
    const row = this.database
      .select()
      .from(taps)
      .where(and(eq(taps.userId, viewer.userId!), eq(taps.key, key)))
      .get();
    if (!row) return null;
    if (row.request !== request) throw conflict('This Idempotency-Key was used for another request.');
    return { answer: row.answer as T };
  }
}
