import { mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { migrateDatabase, openDatabase } from '@hubtack/drizzle/database.js';
import { sites } from '@hubtack/drizzle/schema/sites.js';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { backUp, problemOf, restore } from './copies.js';

let folder: string;
let file: string;
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'hubtack-copies-'));
  file = join(folder, 'hubtack.sqlite');
});
afterEach(() => rmSync(folder, { recursive: true }));

function open() {
  const database = openDatabase(file);
  migrateDatabase(database);
  return database;
}
const names = () => {
  const database = openDatabase(file);
  const found = database
    .select()
    .from(sites)
    .all()
    .map(({ name }) => name);
  database.$client.close();
  return found;
};

it('a copy made while the database is open restores what was there, and keeps the newer one aside', async () => {
  const database = open();
  database.insert(sites).values({ name: 'Before' }).run();
  await backUp(file, join(folder, 'copy.sqlite'));
  database.insert(sites).values({ name: 'After' }).run();
  database.$client.close();
  const aside = await restore(join(folder, 'copy.sqlite'), file, new Date(0));
  expect(names()).toEqual(['Before']);
  expect(problemOf(aside!)).toBeNull();
});
it('never overwrites a copy', async () => {
  open().$client.close();
  await backUp(file, join(folder, 'copy.sqlite'));
  await expect(backUp(file, join(folder, 'copy.sqlite'))).rejects.toThrow('there already');
});
it('does not restore under a running server, nor from something else', async () => {
  const database = open();
  await backUp(file, join(folder, 'copy.sqlite'));
  await expect(restore(join(folder, 'copy.sqlite'), file, new Date(0))).rejects.toThrow('Stop it first');
  writeFileSync(join(folder, 'other.sqlite'), 'no database');
  await expect(restore(join(folder, 'other.sqlite'), file, new Date(0))).rejects.toThrow(
    'no SQLite database',
  );
  database.$client.close();
  expect(readdirSync(folder).filter((name) => name.includes('before-restore'))).toEqual([]);
});
