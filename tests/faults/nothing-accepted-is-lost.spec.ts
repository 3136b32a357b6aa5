import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { spansOf, partition, totalsOf } from '@hubtack/backend/fixes/timeline.js';
import { forward } from '@hubtack/simulators/replay/forwarder.js';
import { Spool } from '@hubtack/simulators/replay/spool.js';
import BetterSqlite3 from 'better-sqlite3';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Client, postSentences } from '../harness/client.js';
import { gga } from '../harness/sentences.js';
import { ServerProcess } from '../harness/server-process.js';
import { timelineOf } from '../harness/timeline.js';
import { until } from '../harness/until.js';

const KILLS = 12;
let server: ServerProcess;
let key: string;
let roverId: number;

beforeAll(async () => {
  server = await ServerProcess.make();
  await server.start();
  const client = await manager();
  ({ id: roverId } = await client.json<{ id: number }>('POST', '/api/rovers', { label: 'R-kill' }));
  ({ key } = await client.json<{ key: string }>('POST', `/api/rovers/${roverId}/key`));
});
afterAll(() => server.remove());

async function manager(): Promise<Client> {
  const client = new Client(server.url);
  await client.signIn('manager@pennywort.example', 'tack-in-the-hub');
  return client;
}
const START = Math.floor(Date.now() / 1000) * 1000 - 7_200_000;
const quality = (second: number) => (second % 40 < 25 ? 4 : 5);

describe('kill -9 in the middle of a load, many times', () => {
  it('every epoch that was answered accepted is there, and the end equals an undisturbed run', async () => {
    let sent = 0;
    let answered = 0;
    for (let kill = 0; kill < KILLS; kill++) {
      // Several posts are on their way at the moment of the kill.
      const killAfter = 5 + kill * 3;
      let posts = 0;
      const send = async () => {
        for (;;) {
          const second = sent++;
          try {
            const { body } = await postSentences(
              server.url,
              key,
              gga(START + second * 1000, quality(second)),
            );
            answered += body.accepted;
          } catch {
            return;
          }
          posts++;
        }
      };
      const senders = [send(), send(), send(), send()];
      await until(() => expect(posts).toBeGreaterThanOrEqual(killAfter));
      await server.kill();
      await Promise.all(senders);
      const database = new BetterSqlite3(server.databaseFile);
      const kept = database
        .prepare('SELECT count(*) FROM epochs WHERE rover_id = ?')
        .pluck()
        .get(roverId) as number;
      database.close();
      expect(kept).toBeGreaterThanOrEqual(answered);
      // A post that was cut off may have been stored: it was only never answered.
      answered = kept;
      await server.start();
    }
    // The sender forwards everything it has no answer for; here simply all of it, once more, shuffled in blocks.
    const spool = new Spool(join(server.folder, 'spool'));
    for (let second = 0; second < sent; second += 50) {
      const seconds = Array.from({ length: Math.min(50, sent - second) }, (_, index) => second + index);
      const body = new TextEncoder().encode(
        seconds.map((at) => gga(START + at * 1000, quality(at))).join(''),
      );
      spool.keep({ date: new Date(START + second * 1000).toISOString().slice(0, 10), body });
    }
    const result = await forward({ url: server.url, key, spool, isFinished: () => true });
    expect(result.accepted + result.duplicates).toBe(sent);
    const epochs = Array.from({ length: sent }, (_, at) => ({
      time: START + at * 1000,
      quality: quality(at),
    }));
    const end = START + sent * 1000;
    const { totals } = await timelineOf(
      await manager(),
      roverId,
      new Date(START).toISOString(),
      new Date(end).toISOString(),
    );
    expect(totals).toEqual(totalsOf(partition(spansOf(epochs), START, end, Date.now())));
  });
});

describe('the store refuses', () => {
  const post = (second: number) => postSentences(server.url, key, gga(START - 3_600_000 + second * 1000));

  it('a locked database is answered 503, and the next post after it is taken', async () => {
    const other = new BetterSqlite3(server.databaseFile);
    other.exec('BEGIN IMMEDIATE');
    const refused = await post(1);
    expect([refused.status, refused.body.code]).toEqual([503, 'storageBusy']);
    other.exec('ROLLBACK');
    other.close();
    expect((await post(1)).body).toMatchObject({ accepted: 1 });
  });

  it('stops gracefully: what waits is stored, streams are closed, the process ends', async () => {
    const posts = Array.from({ length: 50 }, (_, index) => post(100 + index).catch(() => null));
    const answers = Promise.all(posts);
    await until(async () => expect((await post(99)).status).toBe(200));
    await server.stop();
    const accepted = (await answers).reduce((sum, answer) => sum + (answer?.body.accepted ?? 0), 0);
    const database = new BetterSqlite3(server.databaseFile);
    const kept = database
      .prepare('SELECT count(*) FROM epochs WHERE rover_id = ? AND time >= ? AND time < ?')
      .pluck()
      .get(roverId, START - 3_600_000 + 100_000, START - 3_600_000 + 150_000) as number;
    database.close();
    expect(kept).toBeGreaterThanOrEqual(accepted);
    expect(readFileSync(server.databaseFile).subarray(0, 15).toString()).toBe('SQLite format 3');
    await server.start();
  });
});
