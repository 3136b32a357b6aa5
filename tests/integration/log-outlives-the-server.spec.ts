import { mkdirSync, mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { LogWithDetail } from '@hubtack/contracts/logs/log.js';
import { openDatabase, migrateDatabase } from '@hubtack/drizzle/database.js';
import { epochs } from '@hubtack/drizzle/schema/epochs.js';
import { logs } from '@hubtack/drizzle/schema/logs.js';
import { expect, it } from 'vitest';
import { readLog, uploadLog } from '../harness/log-upload.js';
import { published, recording } from '../harness/recordings.js';
import { gga } from '../harness/sentences.js';
import { startServer } from '../harness/server.js';
import { until } from '../harness/until.js';

const name = (digit: number): string => `0000000${digit}-0000-4000-8000-000000000000.log`;

it('what was answered for is read after a crash; what nobody was answered for goes', async () => {
  const folder = mkdtempSync(join(tmpdir(), 'hubtack-crash-'));
  const files = join(folder, 'uploads', 'logs');
  mkdirSync(files, { recursive: true });
  // As a crash leaves it: one was being read, one waited, one lost its file, and an upload broke off.
  const databaseFile = join(folder, 'hubtack.sqlite');
  const database = openDatabase(databaseFile);
  migrateDatabase(database);
  const row = { name: 'walk.nmea', bytes: 136_199, at: Date.now(), by: 'Ada' };
  for (const [digit, status] of [
    [1, 'reading'],
    [2, 'waiting'],
    [3, 'reading'],
  ] as const)
    database
      .insert(logs)
      .values({ ...row, file: name(digit), status })
      .run();
  database.$client.close();
  for (const digit of [1, 2]) writeFileSync(join(files, name(digit)), recording(published.walk.file));
  writeFileSync(join(files, name(4)), 'half of');
  writeFileSync(join(files, 'not-ours.txt'), 'left alone');

  const server = await startServer({ DATABASE_FILE: databaseFile, UPLOADS_DIR: join(folder, 'uploads') });
  const technician = await server.as('technician');
  for (const id of [1, 2])
    expect(await readLog(technician, id)).toMatchObject({
      status: 'done',
      summary: { epochs: published.walk.epochs, totals: published.walk.totals },
    });
  const lost = await technician.json<LogWithDetail>('GET', '/api/logs/3');
  expect([lost.status, lost.problem]).toEqual(['failed', 'The file is no longer there. Upload it again.']);
  await server.close();
  expect(readdirSync(files)).toEqual(['not-ours.txt']);
  rmSync(folder, { recursive: true });
});

it('a server that is stopped while it reads goes on after its next start, and enters nothing twice', async () => {
  const folder = mkdtempSync(join(tmpdir(), 'hubtack-stop-'));
  const environment = { DATABASE_FILE: join(folder, 'hubtack.sqlite'), UPLOADS_DIR: join(folder, 'uploads') };
  const start = Math.floor(Date.now() / 1000) * 1000 - 40_000_000;
  const text = Array.from({ length: 20_000 }, (_, second) => gga(start + second * 1000)).join('');

  const first = await startServer(environment);
  const rover = await first.makeRover();
  const { body } = await uploadLog(await first.as('technician'), text, {
    roverId: String(rover.id),
    date: new Date(start).toISOString().slice(0, 10),
  });
  // Some of it has entered, most has not.
  await until(() => expect(first.database.select().from(epochs).limit(1).all()).toHaveLength(1));
  await first.close();

  const second = await startServer(environment);
  const log = await readLog(await second.as('dispatcher'), body.id);
  const history = log.detail!.history!;
  expect(log.summary!.epochs).toBe(20_000);
  expect(history.duplicates).toBeGreaterThan(0);
  expect(history.accepted + history.duplicates).toBe(20_000);
  await second.close();
  rmSync(folder, { recursive: true });
});
