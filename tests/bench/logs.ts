import { closeSync, openAsBlob, openSync, readSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { LogAnalysis } from '@hubtack/backend/logs/analyse-log.js';
import { FirstDayFinder } from '@hubtack/backend/logs/first-day.js';
import { MAX_LOG_BYTES, type LogWithDetail } from '@hubtack/contracts/logs/log.js';
import { defaultLimits } from '@hubtack/contracts/lost-fixes/limits.js';
import { Child, makeFolder, removeFolder } from './child.js';
import { readGga } from './floors/read-gga.js';
import { writeLog } from './log-file.js';
import type { Row } from './report.js';
import { median, percentile } from './statistics.js';

const ROUNDS = 5;
const CHUNK_BYTES = 256 * 1024;
const MB = 2 ** 20;

function* chunksOf(path: string): Generator<Uint8Array> {
  const buffer = Buffer.allocUnsafe(CHUNK_BYTES);
  const file = openSync(path, 'r');
  for (;;) {
    const length = readSync(file, buffer, 0, CHUNK_BYTES, null);
    if (length === 0) break;
    yield buffer.subarray(0, length);
  }
  closeSync(file);
}

/** Everything that the thread does, but for sending. */
function ours(path: string): number {
  const receivedAt = Date.now();
  const finder = new FirstDayFinder(receivedAt);
  for (const chunk of chunksOf(path)) if (finder.push(chunk)) break;
  const analysis = new LogAnalysis({
    firstDay: finder.finish(),
    hasDates: finder.hasDates,
    receivedAt,
    limits: defaultLimits,
    base: null,
    history: null,
  });
  for (const chunk of chunksOf(path)) analysis.push(chunk);
  analysis.finish();
  const answer = analysis.answer();
  return answer.kind === 'done' ? answer.summary.epochs : 0;
}

/** A bare line splitter and parser: what reading the GGAs of the file costs at least, done plainly. */
function bare(path: string): number {
  let [carry, read] = ['', 0];
  const now = Date.now();
  for (const chunk of chunksOf(path)) {
    const lines = (carry + (chunk as Buffer).toString('latin1')).split('\n');
    carry = lines.pop()!;
    for (const line of lines) if (readGga(line, 1, now)) read++;
  }
  return read;
}

interface Measured {
  p99Ms: number;
  maxMs: number;
  rssMb: number;
  peakMb: number;
}

/** The server with a log on its way in and being read, while somebody looks at the board. */
class LogServer {
  private constructor(
    private readonly child: Child,
    private readonly cookie: string,
    readonly roverId: number,
  ) {}

  static async start(): Promise<LogServer> {
    const child = await Child.start('./ours-logs.js', []);
    const { cookie, roverId } = child.told as { cookie: string; roverId: number };
    return new LogServer(child, cookie, roverId);
  }

  call(path: string, init: RequestInit = {}): Promise<Response> {
    return fetch(`http://127.0.0.1:${this.child.port}${path}`, { ...init, headers: { cookie: this.cookie } });
  }

  measure(): Promise<Measured> {
    return this.child.ask<Measured>({ restart: true });
  }

  /** Uploads a log and waits for what is read of it. */
  async read(path: string, fields: Record<string, string>): Promise<LogWithDetail> {
    const form = new FormData();
    for (const [field, value] of Object.entries(fields)) form.append(field, value);
    form.append('file', await openAsBlob(path), 'bench.nmea');
    const response = await this.call('/api/logs', { method: 'POST', body: form });
    const { id } = (await response.json()) as { id: number };
    for (;;) {
      const log = (await (await this.call(`/api/logs/${id}`)).json()) as LogWithDetail;
      if (log.status !== 'waiting' && log.status !== 'reading') return log;
      await pause(100);
    }
  }

  /** Looks at the board until the work is over; answers how long each look took, ms. */
  async boardWhile(work: Promise<unknown>): Promise<number[]> {
    const [took, state] = [[] as number[], { isOver: false }];
    const end = () => {
      state.isOver = true;
    };
    work.then(end, end);
    while (!state.isOver) {
      const began = performance.now();
      await (await this.call('/api/board')).arrayBuffer();
      took.push(performance.now() - began);
      await pause(20);
    }
    await work;
    return took;
  }

  async stop(): Promise<void> {
    await this.child.ask({ close: true });
    await this.child.stop();
  }
}

const pause = (ms: number): Promise<void> =>
  new Promise((resolve) => {
    setTimeout(resolve, ms);
  });

/** A hundred megabytes: how fast they are read, and what the server is like meanwhile. */
export async function logs(): Promise<Row[]> {
  const folder = makeFolder();
  try {
    const path = join(folder, 'bench.nmea');
    const epochs = writeLog(path, MAX_LOG_BYTES, Date.now());
    const megabytes = statSync(path).size / MB;
    const [value, floor] = readingRates(path, megabytes, epochs);
    const rows: Row[] = [{ name: 'logs/read', value, unit: 'MB/s', floor, ratio: value / floor, n: ROUNDS }];
    const tenth = join(folder, 'tenth.nmea');
    writeLog(tenth, MAX_LOG_BYTES / 10, Date.now());
    for (const way of ['logs', 'logs/history'])
      rows.push(...(await whileServing(way, { path, tenth }, megabytes, epochs)));
    return rows;
  } finally {
    removeFolder(folder);
  }
}

function readingRates(path: string, megabytes: number, epochs: number): [number, number] {
  const rates: [number[], number[]] = [[], []];
  for (let round = -1; round < ROUNDS; round++)
    for (const [index, read] of [ours, bare].entries()) {
      const began = performance.now();
      if (read(path) !== epochs) throw new Error('not all epochs of the log were read');
      if (round >= 0) rates[index]!.push((megabytes * 1000) / (performance.now() - began));
    }
  return [median(rates[0]), median(rates[1])];
}

async function whileServing(
  way: string,
  { path, tenth }: { path: string; tenth: string },
  megabytes: number,
  epochs: number,
): Promise<Row[]> {
  const server = await LogServer.start();
  const fields: Record<string, string> = way === 'logs/history' ? { roverId: String(server.roverId) } : {};
  await server.boardWhile(pause(2000));
  const fresh = await server.measure();
  // A tenth of it first: memory is flat when ten times as much takes no more.
  await server.boardWhile(server.read(tenth, {}));
  const small = await server.measure();
  const idle = percentile(await server.boardWhile(pause(5000)), 0.99);
  const before = await server.measure();
  const began = performance.now();
  const work = server.read(path, fields);
  const looks = await server.boardWhile(work);
  const seconds = (performance.now() - began) / 1000;
  const log = await work;
  const after = await server.measure();
  await server.stop();
  const entered = log.detail?.history?.accepted;
  if (log.summary?.epochs !== epochs || (entered !== undefined && entered !== epochs))
    throw new Error(`the log came to ${log.status}: ${log.problem}`);
  const row = (name: string, unit: string, value: number, floor: number | null, n: number): Row => ({
    name: `${way}/${name}`,
    value,
    unit,
    floor,
    ratio: floor === null ? null : value / floor,
    n,
  });
  const n = looks.length;
  return [
    row('upload-to-answer', 'MB/s', megabytes / seconds, null, 1),
    row('event-loop-p99', 'ms', after.p99Ms, before.p99Ms, n),
    row('event-loop-max', 'ms', after.maxMs, before.maxMs, n),
    row('board-p99', 'ms', percentile(looks, 0.99), idle, n),
    row('memory-growth', 'MB', after.peakMb - fresh.rssMb, small.peakMb - fresh.rssMb, 1),
  ];
}
