import { setTimeout as delay } from 'node:timers/promises';
import { Child } from './child.js';
import { HttpConnection } from './load/http-connection.js';
import { StreamDrain } from './load/stream-drain.js';
import { gga } from '../harness/sentences.js';
import { Ours } from './ours.js';
import type { Row } from './report.js';
import { median, percentile } from './statistics.js';

const FRAMES = 10;
const ROUNDS = 3;
/** One frame period of the board. */
const FRAME_MS = 250;

interface Told {
  cpu: { user: number; system: number };
  readers: number;
}

/** Server time for one frame to all readers, ms of CPU. */
async function cpuPerFrame(child: Child, drains: readonly StreamDrain[]): Promise<number> {
  const total = ({ cpu }: Told) => (cpu.user + cpu.system) / 1000;
  const before = total(await child.ask<Told>({}));
  for (let frame = 0; frame < FRAMES; frame++) {
    await child.ask({ frame: true });
    let read = -1;
    // The next frame goes out when all readers have this one.
    for (;;) {
      await delay(20);
      const now = drains.reduce((sum, drain) => sum + drain.bytes, 0);
      if (now === read) break;
      read = now;
    }
  }
  return (total(await child.ask<Told>({})) - before) / FRAMES;
}

/** Our hub against a bare broadcast that serialises each frame once: CPU of the server for each frame. */
export async function fanOut(): Promise<Row[]> {
  const rows: Row[] = [];
  for (const [readers, lanes] of [
    [200, 50],
    [1000, 50],
    [200, 500],
    [1000, 500],
  ] as const) {
    const programs = ['ours-broadcast.js', 'floors/broadcast.js'];
    const children = await Promise.all(programs.map((program) => Child.start(program, [String(lanes)])));
    const drains = await Promise.all(
      children.map(({ port }) =>
        Promise.all(Array.from({ length: readers }, () => StreamDrain.open(port, '', '/'))),
      ),
    );
    const results: number[][] = [[], []];
    for (let round = 0; round <= ROUNDS; round++) {
      for (const [index, child] of children.entries()) {
        const cpu = await cpuPerFrame(child, drains[index]!);
        if (round > 0) results[index]!.push(cpu);
      }
    }
    for (const drain of drains.flat()) drain.close();
    for (const child of children) await child.stop();
    const [ours, floor] = results.map(median) as [number, number];
    const name = `stream/fan-out ${readers} readers, ${lanes} lanes`;
    rows.push({ name, value: ours, unit: 'ms CPU/frame', floor, ratio: ours / floor, n: ROUNDS * FRAMES });
  }
  return rows;
}

/** Takes the times at which epochs are read off a stream. */
class EpochWatch {
  private rest = '';

  constructor(private readonly seen: (roverId: number, epochAt: number) => void) {}

  readonly take = (text: string): void => {
    this.rest += text;
    const pattern = /"id":(\d+),"state":"\w+","since":\d+,"heldUntil":\d+,"lastEpochAt":(\d+)/g;
    let end = 0;
    for (const match of this.rest.matchAll(pattern)) {
      this.seen(Number(match[1]), Number(match[2]));
      end = match.index + match[0].length;
    }
    // What is left may be the beginning of the next one.
    this.rest = this.rest.slice(Math.max(end, this.rest.length - 300));
  };
}

interface Delays {
  waits: number[];
  memoryMb: number;
  closed: number;
}

/** Rovers at 1 Hz spread over the second, and readers of which the first looks at what it gets; ms from post to event. */
async function measureFreshness(
  rovers: number,
  readers: number,
  stalled: number,
  seconds: number,
): Promise<Delays> {
  const ours = await Ours.start({ rovers });
  const posted = new Map<string, number>();
  const waits: number[] = [];
  const watch = new EpochWatch((id, epochAt) => {
    const at = posted.get(`${id} ${epochAt}`);
    if (at === undefined) return;
    waits.push(performance.now() - at);
    posted.delete(`${id} ${epochAt}`);
  });
  const path = '/api/board/stream';
  const cookie = ours.client.cookieHeader;
  const drains = [await StreamDrain.open(ours.port, cookie, path, watch.take)];
  while (drains.length < readers) drains.push(await StreamDrain.open(ours.port, cookie, path));
  for (const drain of drains.slice(readers - stalled)) drain.stall();
  const connections = await Promise.all(ours.keys.map((key) => HttpConnection.open(ours.port, key)));
  const first = Math.floor(Date.now() / 1000) * 1000;
  const warmUp = 3;
  for (let second = 0; second < seconds + warmUp; second++) {
    if (second === warmUp) waits.length = 0;
    const began = performance.now();
    const time = first + second * 1000;
    await Promise.all(
      connections.map(async (connection, index) => {
        await delay((index / connections.length) * 900);
        posted.set(`${index + 1} ${time}`, performance.now());
        await connection.post(Buffer.from(gga(time), 'latin1'));
      }),
    );
    await delay(Math.max(0, began + 1000 - performance.now()));
  }
  await delay(2 * FRAME_MS);
  const memoryMb = ours.memoryMb();
  const closed = drains.filter((drain) => drain.isClosed).length;
  for (const connection of connections) connection.close();
  for (const drain of drains) drain.close();
  await ours.stop();
  return { waits, memoryMb, closed };
}

/** 500 rovers at 1 Hz, 50 readers: from the post of a sentence to its event being read. */
export async function freshness(): Promise<Row[]> {
  const { waits } = await measureFreshness(500, 50, 0, 10);
  return [0.5, 0.99].map((p) => {
    const value = percentile(waits, p);
    return {
      name: `stream/freshness p${p * 100}`,
      value,
      unit: 'ms',
      floor: FRAME_MS,
      ratio: value / FRAME_MS,
      n: waits.length,
    };
  });
}

/** Twenty of two hundred readers stop reading: what the others notice, and what it costs in memory. */
export async function stalled(): Promise<Row[]> {
  const without = await measureFreshness(500, 200, 0, 25);
  // Long enough for the buffers of the network to fill, and then for the server to lose patience.
  const withStalled = await measureFreshness(500, 200, 20, 45);
  const [value, floor] = [withStalled, without].map(({ waits }) => percentile(waits, 0.99)) as [
    number,
    number,
  ];
  return [
    {
      name: 'stream/stalled p99 of the others',
      value,
      unit: 'ms',
      floor,
      ratio: value / floor,
      n: withStalled.waits.length,
    },
    {
      name: 'stream/stalled memory',
      value: withStalled.memoryMb,
      unit: 'MB resident',
      floor: without.memoryMb,
      ratio: withStalled.memoryMb / without.memoryMb,
      n: 1,
    },
    {
      name: 'stream/stalled closed',
      value: withStalled.closed,
      unit: 'of 20 stalled readers',
      floor: null,
      ratio: null,
      n: 20,
    },
  ];
}
