import { existsSync, mkdirSync, renameSync, rmSync } from 'node:fs';
import { dirname } from 'node:path';
import BetterSqlite3 from 'better-sqlite3';

/** What an operator can be told in one line. */
export class CopyRefused extends Error {}

/** Whether a file is a whole Hubtack database; answers what is wrong with it, or null. */
export function problemOf(file: string): string | null {
  let database: BetterSqlite3.Database;
  try {
    database = new BetterSqlite3(file, { readonly: true, fileMustExist: true });
  } catch {
    return 'cannot be opened';
  }
  try {
    const check = database.pragma('integrity_check', { simple: true }) as string;
    if (check !== 'ok') return `is damaged: ${check}`;
    const known = database
      .prepare("SELECT 1 FROM sqlite_master WHERE type = 'table' AND name = 'epochs'")
      .get();
    return known ? null : 'is no Hubtack database';
  } catch {
    return 'is no SQLite database';
  } finally {
    database.close();
  }
}

/** Copies a database while a server goes on writing to it, and looks whether the copy is whole. Never overwrites. */
export async function backUp(databaseFile: string, to: string): Promise<void> {
  if (!existsSync(databaseFile)) throw new CopyRefused(`There is no database at ${databaseFile}.`);
  if (existsSync(to)) throw new CopyRefused(`${to} is there already. Name a new file.`);
  mkdirSync(dirname(to), { recursive: true });
  const database = new BetterSqlite3(databaseFile, { readonly: true });
  try {
    await database.backup(to);
  } finally {
    database.close();
  }
  const problem = problemOf(to);
  if (problem) {
    rmSync(to);
    throw new CopyRefused(`The copy ${problem}. Nothing was kept.`);
  }
}

/**
 * Puts a backup in place of the database, which is moved aside, not deleted. Refuses while a server has the database
 * open: it would go on writing to the file that was moved. Answers where the old one is, null when there was none.
 */
export async function restore(from: string, databaseFile: string, now: Date): Promise<string | null> {
  const problem = problemOf(from);
  if (problem) throw new CopyRefused(`${from} ${problem}.`);
  let aside: string | null = null;
  if (existsSync(databaseFile)) {
    if (!isUnused(databaseFile)) throw new CopyRefused('A server has the database open. Stop it first.');
    aside = `${databaseFile}.before-restore-${now.toISOString().replaceAll(/[:.]/g, '-')}`;
    renameSync(databaseFile, aside);
    for (const suffix of ['-wal', '-shm']) rmSync(databaseFile + suffix, { force: true });
  }
  mkdirSync(dirname(databaseFile), { recursive: true });
  const backup = new BetterSqlite3(from, { readonly: true });
  try {
    await backup.backup(databaseFile);
  } finally {
    backup.close();
  }
  return aside;
}

/** Leaving WAL mode needs the file for oneself, and empties the log into it: so an unused file ends whole by itself. */
function isUnused(file: string): boolean {
  const database = new BetterSqlite3(file, { timeout: 0 });
  try {
    return database.pragma('journal_mode = DELETE', { simple: true }) === 'delete';
  } catch {
    return false;
  } finally {
    database.close();
  }
}
