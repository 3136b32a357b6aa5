import { Inject, Injectable } from '@nestjs/common';
import { SECRETS } from '../config/config.module.js';
import type { Secrets } from '../config/secrets.js';
import { seal, sealingKey, unseal } from './sealing.js';

const contextOf = (sourceId: number): string => `correction source ${sourceId}`;

/** Passwords of correction sources: sealed on the way into the database, opened for a check only. */
@Injectable()
export class CorrectionPasswords {
  private readonly key: Uint8Array;

  constructor(@Inject(SECRETS) secrets: Secrets) {
    this.key = sealingKey(secrets.secretsKey);
  }

  seal(sourceId: number, password: string): string {
    return seal(password, this.key, contextOf(sourceId));
  }

  /** @throws SealBroken when SECRETS_KEY is another than it was sealed with */
  open(sourceId: number, sealed: string): string {
    return unseal(sealed, this.key, contextOf(sourceId));
  }
}
