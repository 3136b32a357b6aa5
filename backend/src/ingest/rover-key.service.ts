import { hash } from 'node:crypto';
import { Inject, Injectable, Logger } from '@nestjs/common';
import { Interval } from '@nestjs/schedule';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { roverKeys, rovers } from '@hubtack/drizzle/schema/rovers.js';
import { eq } from 'drizzle-orm';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import { ProblemException } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';

export interface KnownKey {
  keyId: number;
  roverId: number;
}

/** Keys are 256 random bits, so a fast hash keeps them as safe at rest as a slow one would. */
export const hashOfKey = (key: string): string => hash('sha256', key, 'hex');

/** Which rover a key belongs to. Held in memory by hash, read anew after a change of keys. */
@Injectable()
export class RoverKeyService {
  private readonly logger = new Logger(RoverKeyService.name);
  private active: Map<string, KnownKey> | null = null;
  private revoked = new Set<string>();
  private readonly used = new Map<number, number>();

  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly clock: Clock,
    changes: Changes,
  ) {
    changes.all.subscribe((change) => {
      if (change.kind === 'roverKeys' || change.kind === 'firm') this.active = null;
    });
  }

  /** The rover of a key; `revoked` for one that was taken back or whose rover is retired, `unknown` for any other text. */
  find(key: string): KnownKey | 'revoked' | 'unknown' {
    const active = this.active ?? this.load();
    const keyHash = hashOfKey(key);
    const known = active.get(keyHash);
    if (!known) return this.revoked.has(keyHash) ? 'revoked' : 'unknown';
    this.used.set(known.keyId, this.clock.now());
    return known;
  }

  /** The rover that a request's Authorization header speaks for; throws 401 with the reason. */
  authorise(authorization: string | undefined): number {
    if (!authorization?.startsWith('Bearer '))
      throw new ProblemException(
        401,
        'roverKeyUnknown',
        'Send the rover key as "Authorization: Bearer <key>".',
      );
    const known = this.find(authorization.slice(7).trim());
    if (known === 'revoked')
      throw new ProblemException(401, 'roverKeyRevoked', 'This rover key has been taken back.');
    if (known === 'unknown') throw new ProblemException(401, 'roverKeyUnknown', 'No rover has this key.');
    return known.roverId;
  }

  /** When a key was last used is good to the half minute: no write for each post. */
  @Interval(30_000)
  storeUse(): void {
    try {
      this.database.transaction((tx) => {
        for (const [keyId, lastUsedAt] of this.used)
          tx.update(roverKeys).set({ lastUsedAt }).where(eq(roverKeys.id, keyId)).run();
      });
      this.used.clear();
    } catch (error) {
      this.logger.warn({ err: error }, 'last use of keys not stored; tried again later');
    }
  }

  private load(): Map<string, KnownKey> {
    const active = new Map<string, KnownKey>();
    const revoked = new Set<string>();
    const rows = this.database
      .select({
        keyId: roverKeys.id,
        roverId: roverKeys.roverId,
        keyHash: roverKeys.keyHash,
        revokedAt: roverKeys.revokedAt,
        retired: rovers.retired,
      })
      .from(roverKeys)
      .innerJoin(rovers, eq(rovers.id, roverKeys.roverId))
      .all();
    for (const { keyId, roverId, keyHash, revokedAt, retired } of rows) {
      if (revokedAt !== null || retired) revoked.add(keyHash);
      else active.set(keyHash, { keyId, roverId });
    }
    this.revoked = revoked;
    this.active = active;
    return active;
  }
}
