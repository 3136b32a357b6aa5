import { connect, type Socket } from 'node:net';
import { setTimeout as delay } from 'node:timers/promises';
import { join } from 'node:path';
import { Child, makeFolder, removeFolder } from './child.js';
import { Seconds } from './load/sentences.js';
import { StreamDrain } from './load/stream-drain.js';
import { Ours } from './ours.js';
import type { Row } from './report.js';
import { median } from './statistics.js';

const CONNECTIONS = 500;
const BLOCK = 60;
const BLOCKS_A_ROUND = 10;
const ROUNDS = 5;
const SENTENCES = CONNECTIONS * BLOCK * BLOCKS_A_ROUND;

interface Target {
  port: number;
  keys: string[];
  stored: () => Promise<number>;
  bytesWritten: () => number;
}

class TcpLoad {
  private sockets: Socket[] = [];

  constructor(
    private readonly target: Target,
    private readonly seconds: Seconds,
  ) {}

  async open(): Promise<void> {
    this.sockets = await Promise.all(
      this.target.keys.map(
        (key) =>
          new Promise<Socket>((resolve, reject) => {
            const socket = connect(this.target.port, '127.0.0.1', () => resolve(socket));
            socket.on('error', reject);
            socket.write(`KEY ${key}\r\n`);
          }),
      ),
    );
    // The first second of a live stream waits for its date: that is not what is measured here.
    await this.send(1, this.seconds.block(1));
    await delay(1200);
    await this.send(1, this.seconds.block(1));
  }

  /** Sentences a second, and bytes written to disk for each. */
  async round(): Promise<{ perSecond: number; bytesPerRow: number }> {
    const block = Array.from({ length: BLOCKS_A_ROUND }, () => this.seconds.block(BLOCK));
    const before = this.target.bytesWritten();
    const began = performance.now();
    await this.send(BLOCK * BLOCKS_A_ROUND, ...block);
    const seconds = (performance.now() - began) / 1000;
    const bytesPerRow = (this.target.bytesWritten() - before) / SENTENCES;
    return { perSecond: SENTENCES / seconds, bytesPerRow };
  }

  close(): void {
    for (const socket of this.sockets) socket.destroy();
  }

  private async send(sentences: number, ...blocks: Buffer[]): Promise<void> {
    const wanted = (await this.target.stored()) + sentences * CONNECTIONS;
    for (const block of blocks) {
      await Promise.all(
        this.sockets.map((socket) =>
          socket.write(block)
            ? Promise.resolve()
            : new Promise<void>((resolve) => socket.once('drain', () => resolve())),
        ),
      );
    }
    for (let tries = 0; (await this.target.stored()) < wanted; tries++) {
      if (tries > 3000) throw new Error('the sentences did not all arrive');
      await delay(10);
    }
  }
}

/** 500 connections, blocks of sentences, all the way: parsed, dated, timeline, durable, the board fed. */
export async function ingestTcp(): Promise<Row[]> {
  const folder = makeFolder();
  const ours = await Ours.start({ rovers: CONNECTIONS });
  const floor = await Child.start('floors/tcp.js', [join(folder, 'floor.sqlite')]);
  const board = await StreamDrain.open(ours.port, ours.client.cookieHeader, '/api/board/stream');
  const loads = [
    new TcpLoad(
      {
        port: ours.tcpPort,
        keys: ours.keys,
        stored: () => ours.accepted(),
        bytesWritten: () => ours.bytesWritten(),
      },
      new Seconds(),
    ),
    new TcpLoad(
      {
        port: floor.port,
        keys: ours.keys.map((_, index) => String(index + 1)),
        stored: async () => (await floor.ask<{ stored: number }>({})).stored,
        bytesWritten: () => floor.bytesWritten(),
      },
      new Seconds(),
    ),
  ] as const;
  const results: { perSecond: number; bytesPerRow: number }[][] = [[], []];
  for (const load of loads) await load.open();
  for (let round = 0; round < ROUNDS; round++)
    for (const [index, load] of loads.entries()) results[index]!.push(await load.round());
  for (const load of loads) load.close();
  board.close();
  await ours.stop();
  await floor.stop();
  removeFolder(folder);
  const [a, b] = results.map((list) => median(list.map(({ perSecond }) => perSecond))) as [number, number];
  const [bytes, floorBytes] = results.map((list) => median(list.map(({ bytesPerRow }) => bytesPerRow))) as [
    number,
    number,
  ];
  return [
    { name: 'ingest/tcp', value: a, unit: 'sentences/s', floor: b, ratio: a / b, n: ROUNDS },
    {
      name: 'ingest/tcp-disk',
      value: bytes,
      unit: 'bytes written/row',
      floor: floorBytes,
      ratio: bytes / floorBytes,
      n: ROUNDS,
    },
  ];
}
