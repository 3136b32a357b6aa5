import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { migrateDatabase, openDatabase, type HubtackDatabase } from '../database.js';

/** A database of a test's own, built by the real migrations on a real file. */
export function makeTestDatabase(): { database: HubtackDatabase; file: string; remove: () => void } {
  const folder = mkdtempSync(join(tmpdir(), 'hubtack-test-'));
  const file = join(folder, 'hubtack.sqlite');
  const database = openDatabase(file);
  migrateDatabase(database);
  return {
    database,
    file,
    remove: () => {
      database.$client.close();
      rmSync(folder, { recursive: true, force: true });
    },
  };
}
