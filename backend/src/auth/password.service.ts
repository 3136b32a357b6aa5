import { Injectable } from '@nestjs/common';
import argon2 from 'argon2';

/** OWASP Password Storage Cheat Sheet: argon2id with m = 19 MiB, t = 2, p = 1 at least. */
const OPTIONS = { type: argon2.argon2id, memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const;

@Injectable()
export class PasswordService {
  private readonly decoy = this.hash('nobody has this password');

  hash(password: string): Promise<string> {
    return argon2.hash(password, OPTIONS);
  }

  /** Takes as long for an account that does not exist, so that time does not tell which do. */
  async verify(passwordHash: string | null, password: string): Promise<boolean> {
    const matches = await argon2.verify(passwordHash ?? (await this.decoy), password);
    return matches && passwordHash !== null;
  }
}
