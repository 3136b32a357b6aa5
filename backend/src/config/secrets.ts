import { randomBytes } from 'node:crypto';
import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import type { Environment } from './environment.js';

/** Reads a secret kept under var/, or makes it at the first start (mode 600). */
function keptSecret(folder: string, name: string): string {
  const file = join(folder, name);
  try {
    return readFileSync(file, 'utf8').trim();
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'ENOENT') throw error;
  }
  const secret = randomBytes(48).toString('base64url');
  mkdirSync(folder, { recursive: true });
  writeFileSync(file, `${secret}\n`, { mode: 0o600, flag: 'wx' });
  return secret;
}

export interface Secrets {
  sessionSecret: string;
  /** What passwords of correction sources are sealed with. */
  secretsKey: string;
}

export function loadSecrets(environment: Environment): Secrets {
  const folder = dirname(environment.DATABASE_FILE);
  return {
    sessionSecret: environment.SESSION_SECRET ?? keptSecret(folder, 'session-secret'),
    secretsKey: environment.SECRETS_KEY ?? keptSecret(folder, 'secrets-key'),
  };
}
