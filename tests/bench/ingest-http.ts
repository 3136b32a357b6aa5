import { join } from 'node:path';
import { setTimeout as delay } from 'node:timers/promises';
import { Child, makeFolder, removeFolder } from './child.js';
import { HttpConnection } from './load/http-connection.js';
import { Seconds } from './load/sentences.js';
import { StreamDrain } from './load/stream-drain.js';
import { Ours } from './ours.js';
import type { Row } from './report.js';
import { median, percentile } from './statistics.js';

const ROUNDS = 5;

/** Connections of one target, each a rover. */
async function openAll(port: number, keys: readonly string[]): Promise<HttpConnection[]> {
  return Promise.all(keys.map((key) => HttpConnection.open(port, key)));
}

const check = (status: number): void => {
  if (status !== 200) throw new Error(`a post was answered ${status}`);
};

/** Every connection posts `posts` blocks, each as soon as the one before is answered; answers posts a second. */
async function postAll(connections: readonly HttpConnection[], blocks: readonly Buffer[]): Promise<number> {
  const began = performance.now();
  await Promise.all(
    connections.map(async (connection) => {
      for (const block of blocks) check(await connection.post(block));
    }),
  );
  return (connections.length * blocks.length) / ((performance.now() - began) / 1000);
}

interface Contestants {
  ours: Ours;
  board: StreamDrain;
  floors: Child[];
  folder: string;
  connections: HttpConnection[][];
}

async function start(rovers: number, floors: readonly string[]): Promise<Contestants> {
  const folder = makeFolder();
  const ours = await Ours.start({ rovers });
  const children = [];
  for (const floor of floors)
    children.push(await Child.start(`floors/${floor}.js`, [join(folder, `${floor}.sqlite`)]));
  const board = await StreamDrain.open(ours.port, ours.client.cookieHeader, '/api/board/stream');
  const numbers = ours.keys.map((_, index) => String(index + 1));
  const connections = [await openAll(ours.port, ours.keys)];
  for (const child of children) connections.push(await openAll(child.port, numbers));
  return { ours, board, floors: children, folder, connections };
}

async function stop({ ours, board, floors, folder, connections }: Contestants): Promise<void> {
  for (const connection of connections.flat()) connection.close();
  board.close();
  await ours.stop();
  for (const floor of floors) await floor.stop();
  removeFolder(folder);
}

async function throughput(rovers: number, floors: string[], block: number, posts: number): Promise<number[]> {
  const contestants = await start(rovers, floors);
  const results: number[][] = contestants.connections.map(() => []);
  const seconds = contestants.connections.map(() => new Seconds());
  const warmUp = 2;
  for (let round = -warmUp; round < ROUNDS; round++) {
    for (const [index, connections] of contestants.connections.entries()) {
      const blocks = Array.from({ length: posts }, () => seconds[index]!.block(block));
      const perSecond = await postAll(connections, blocks);
      if (round >= 0) results[index]!.push(perSecond);
    }
  }
  await stop(contestants);
  return results.map(median);
}

/** Posts of sixty sentences. */
export async function ingestHttp60(): Promise<Row[]> {
  const [ours, floor] = (await throughput(100, ['http'], 60, 20)) as [number, number];
  return [
    {
      name: 'ingest/http-60',
      value: ours * 60,
      unit: 'sentences/s',
      floor: floor * 60,
      ratio: ours / floor,
      n: ROUNDS,
    },
  ];
}

/** Posts of one sentence over 500 keep-alive connections. */
export async function ingestHttp1(): Promise<Row[]> {
  const [ours, nest, http] = (await throughput(500, ['nest', 'http'], 1, 20)) as [number, number, number];
  return [
    { name: 'ingest/http-1', value: ours, unit: 'posts/s', floor: nest, ratio: ours / nest, n: ROUNDS },
    {
      name: 'ingest/http-1 (bare node:http)',
      value: ours,
      unit: 'posts/s',
      floor: http,
      ratio: ours / http,
      n: ROUNDS,
    },
  ];
}

const SECONDS_AT_1_HZ = 30;
const WARM_UP_SECONDS = 5;
/** Receivers are synchronised: their sentences come within this time of the full second. */
const BURST_MS = 100;

/** Posts one sentence of every rover within the first 100 ms of each second; answers each post's wait in ms. */
async function atOneHertz(
  connections: readonly HttpConnection[],
  seconds: Seconds,
  count: number,
): Promise<number[]> {
  const waits: number[] = [];
  for (let second = 0; second < count; second++) {
    const body = seconds.block(1);
    const full = performance.now() + 5;
    await Promise.all(
      connections.map(async (connection, index) => {
        await delay(Math.max(0, full + (index / connections.length) * BURST_MS - performance.now()));
        const began = performance.now();
        check(await connection.post(body));
        waits.push(performance.now() - began);
      }),
    );
    await delay(Math.max(0, full + 1000 - performance.now()));
  }
  return waits;
}

/**
 * 500 rovers at 1 Hz, one sentence a post, in bursts: how long each waits for its answer. Each second is a round with its
 * own p50 and p99; the row is the median of the rounds, so that one second in which the machine was elsewhere decides nothing.
 */
export async function ingestAnswer(): Promise<Row[]> {
  const contestants = await start(500, ['nest']);
  const rounds: number[][][] = [[], []];
  const seconds = [new Seconds(), new Seconds()];
  // Turn about, a second each: a server closes a connection that has rested for five.
  for (let second = -WARM_UP_SECONDS; second < SECONDS_AT_1_HZ; second++) {
    for (const [index, connections] of contestants.connections.entries()) {
      const waits = await atOneHertz(connections, seconds[index]!, 1);
      if (second >= 0) rounds[index]!.push(waits);
    }
  }
  await stop(contestants);
  return [0.5, 0.99].map((p) => {
    const [ours, floor] = rounds.map((list) => median(list.map((waits) => percentile(waits, p)))) as [
      number,
      number,
    ];
    return {
      name: `ingest/answer p${p * 100}`,
      value: ours,
      unit: 'ms',
      floor,
      ratio: ours / floor,
      n: SECONDS_AT_1_HZ,
    };
  });
}

/** How many rovers at 1 Hz one machine holds with the board open: the most for which answers keep within a quarter of a second at p99. */
export async function capacity(): Promise<Row[]> {
  const steps = [500, 1000, 2000, 3000, 4000, 6000];
  let held = 0;
  for (const rovers of steps) {
    const contestants = await start(rovers, []);
    const seconds = new Seconds();
    await atOneHertz(contestants.connections[0]!, seconds, 2);
    const began = performance.now();
    const waits = await atOneHertz(contestants.connections[0]!, seconds, 6);
    const took = performance.now() - began;
    await stop(contestants);
    if (percentile(waits, 0.99) > 250 || took > 6 * 1000 * 1.1) break;
    held = rovers;
  }
  return [
    { name: 'capacity', value: held, unit: 'rovers at 1 Hz', floor: null, ratio: null, n: steps.length },
  ];
}
