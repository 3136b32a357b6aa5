import { existsSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** A file of the repository, whether the tests run from their sources or from their build. */
export function fromRoot(path: string): string {
  let folder = dirname(fileURLToPath(import.meta.url));
  while (!existsSync(join(folder, 'package-lock.json'))) folder = dirname(folder);
  return join(folder, path);
}
