import { basename, dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import BetterSqlite3 from 'better-sqlite3';
import { drizzle, type BetterSQLite3Database } from 'drizzle-orm/better-sqlite3';
import { migrate } from 'drizzle-orm/better-sqlite3/migrator';
import * as schema from './schema/index.js';

export type HubtackDatabase = BetterSQLite3Database<typeof schema> & { $client: BetterSqlite3.Database };

const here = dirname(fileURLToPath(import.meta.url));
export const migrationsFolder = join(here, basename(here) === 'dist' ? '..' : '.', 'migrations');

/**
 * Opens a database file with the settings every part relies on: WAL so that readers never wait for the writer,
 * FULL so that what was answered `accepted` survives a power cut, a large checkpoint interval because epochs are
 * written in order and rewritten pages are the cost (measured 1.2 x).
 */
export function openDatabase(file: string): HubtackDatabase {
  const client = new BetterSqlite3(file, { timeout: 250 });
  client.pragma('journal_mode = WAL');
  client.pragma('synchronous = FULL');
  client.pragma('foreign_keys = ON');
  client.pragma('wal_autocheckpoint = 10000');
  client.pragma('cache_size = -65536');
  return drizzle(client, { schema });
}

/** Brings the tables up to date with the committed migrations. Throws when a migration fails; nothing is half-done. */
export function migrateDatabase(database: HubtackDatabase): void {
  migrate(database, { migrationsFolder });
}
