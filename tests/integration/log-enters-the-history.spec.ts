import { CommitQueue } from '@hubtack/backend/fixes/commit.queue.js';
import { ProblemException } from '@hubtack/backend/common/problem.exception.js';
import type { LogWithDetail } from '@hubtack/contracts/logs/log.js';
import { writeGst, writeRmc } from '@hubtack/contracts/nmea/sentence-writer.js';
import { afterAll, afterEach, beforeAll, expect, it, vi } from 'vitest';
import type { Client } from '../harness/client.js';
import { postSentences } from '../harness/client.js';
import { analysed, readLog, uploadLog } from '../harness/log-upload.js';
import { gga } from '../harness/sentences.js';
import { startServer, type TestServer } from '../harness/server.js';
import { timelineOf } from '../harness/timeline.js';
import { until } from '../harness/until.js';

let server: TestServer;
let technician: Client;
beforeAll(async () => {
  server = await startServer();
  technician = await server.as('technician');
});
afterEach(() => {
  vi.restoreAllMocks();
});
afterAll(() => server.close());

const DAY_MS = 86_400_000;
const iso = (time: number) => new Date(time).toISOString();
const yesterday = Math.floor(Date.now() / DAY_MS) * DAY_MS - DAY_MS + 9 * 3_600_000;
const dated = (time: number, quality = 4) =>
  gga(time, quality) +
  writeRmc({ time, latitude: 1, longitude: 1 }) +
  writeGst({ time, sigmaM: 0.01, sigmaAltitudeM: 0.02 });
const seconds = (from: number, to: number, quality = 4) =>
  Array.from({ length: to - from }, (_, index) => dated(yesterday + (from + index) * 1000, quality)).join('');

it('as late sentences: what the ingest has already is a duplicate, what it lacks comes in between', async () => {
  const rover = await server.makeRover();
  await postSentences(server.url, rover.key, seconds(0, 100) + seconds(1000, 1100));
  const log = await analysed(technician, seconds(50, 1050, 5), { roverId: String(rover.id) });
  expect(log).toMatchObject({ status: 'done', roverId: rover.id });
  expect(log.detail!.history).toEqual({ accepted: 900, duplicates: 100, refused: 0, reasons: [] });
  const timeline = await timelineOf(technician, rover.id, iso(yesterday), iso(yesterday + 1_100_000));
  expect(timeline.totals).toMatchObject({ fixedMs: 200_000, floatMs: 900_000, silentMs: 0 });
  const again = await analysed(technician, seconds(50, 1050, 5), { roverId: String(rover.id) });
  expect(again.detail!.history).toMatchObject({ accepted: 0, duplicates: 1000 });
  const audit = await (await server.as('manager')).json('GET', '/api/audit');
  expect(JSON.stringify(audit)).toMatch(/log\.enteredHistory[^}]*"accepted":900/);
});

it('the same epochs as a post of the same bytes, sigmas too', async () => {
  const [posted, uploaded] = [await server.makeRover(), await server.makeRover()];
  const text = seconds(0, 300) + seconds(320, 700, 5);
  await postSentences(server.url, posted.key, text);
  await analysed(technician, text, { roverId: String(uploaded.id) });
  const rows = (roverId: number) =>
    server.database.$client
      .prepare('SELECT * FROM epochs WHERE rover_id = ? ORDER BY time')
      .all(roverId)
      .map((row) => ({ ...(row as object), rover_id: 0 }));
  expect(rows(uploaded.id)).toHaveLength(680);
  expect(rows(uploaded.id)).toEqual(rows(posted.id));
});

it('what is too old or of the future is refused, and said', async () => {
  const rover = await server.makeRover();
  const old = yesterday - 30 * DAY_MS;
  const text = dated(old) + dated(old + 1000) + dated(yesterday) + dated(yesterday + 10 * DAY_MS);
  const { detail, summary } = await analysed(technician, text, { roverId: String(rover.id) });
  expect(summary!.epochs).toBe(4);
  expect(detail!.history).toMatchObject({ accepted: 1, duplicates: 0, refused: 3 });
  expect(detail!.history!.reasons).toEqual([
    expect.stringMatching(/^2 epochs are older than the 14 days/),
    expect.stringMatching(/^1 epoch is more than 5 min ahead/),
  ]);
});

it('waits its turn while the storage is busy, and loses nothing', async () => {
  const rover = await server.makeRover();
  const queue = server.app.get(CommitQueue);
  const add = queue.add.bind(queue);
  let refusals = 3;
  vi.spyOn(queue, 'add').mockImplementation((...args) => {
    if (refusals-- > 0) throw new ProblemException(503, 'storageBusy', 'busy', { retryAfterSeconds: 0.01 });
    return add(...args);
  });
  const log = await analysed(technician, seconds(0, 1200), { roverId: String(rover.id) });
  expect(log.detail!.history).toMatchObject({ accepted: 1200, duplicates: 0 });
});

it('a disk that is full fails the log, in words', async () => {
  const rover = await server.makeRover();
  vi.spyOn(server.app.get(CommitQueue), 'add').mockRejectedValue(new Error('disk full'));
  const log = await analysed(technician, seconds(0, 100), { roverId: String(rover.id) });
  expect(log).toMatchObject({ status: 'failed', summary: null });
  expect(log.problem).not.toContain('disk full');
  vi.restoreAllMocks();
  expect((await analysed(technician, seconds(0, 100))).status).toBe('done');
});

it('one log at a time; stopped while it is read, or before, it stays as cancelled and its file goes', async () => {
  const rover = await server.makeRover();
  const queue = server.app.get(CommitQueue);
  const add = queue.add.bind(queue);
  let release = (): void => undefined;
  const held = new Promise<void>((resolve) => {
    release = resolve;
  });
  let batches = 0;
  vi.spyOn(queue, 'add').mockImplementation(async (...args) => {
    if (++batches > 1) await held;
    return add(...args);
  });
  const first = await uploadLog(technician, seconds(0, 5000), { roverId: String(rover.id) });
  const second = await uploadLog(technician, seconds(0, 100));
  const third = await uploadLog(technician, seconds(0, 100));
  const log = (id: number) => technician.json<LogWithDetail>('GET', `/api/logs/${id}`);
  await until(() => expect(batches).toBe(2));
  expect((await log(first.body.id)).status).toBe('reading');
  expect((await log(second.body.id)).status).toBe('waiting');
  expect((await technician.call('DELETE', `/api/logs/${second.body.id}`)).status).toBe(204);
  expect((await technician.call('DELETE', `/api/logs/${first.body.id}`)).status).toBe(204);
  release();
  expect((await readLog(technician, third.body.id)).status).toBe('done');
  expect(await log(second.body.id)).toMatchObject({ status: 'cancelled', summary: null });
  await until(async () =>
    expect(await log(first.body.id)).toMatchObject({
      status: 'cancelled',
      problem: expect.stringMatching(/Cancelled after \d+ epochs had entered/) as string,
    }),
  );
  expect((await technician.call('DELETE', `/api/logs/${first.body.id}`)).status).toBe(204);
  expect((await technician.call('GET', `/api/logs/${first.body.id}`)).status).toBe(404);
});
