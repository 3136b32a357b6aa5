import type { Socket } from 'node:net';
import { gzipSync } from 'node:zlib';
import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import { between, randomOf } from '../scenarios/random.js';
import { framesOf, type FrameSource } from './frames.js';
import type { MountPointOptions } from './mount-point.js';
import { readPosition } from './position.js';

interface StreamOptions {
  isChunked: boolean;
  isCompressed: boolean;
  seed: number;
  secondMs: number;
  /** Now, ms UTC. */
  startAt: number;
}

/** A client that takes nothing for so long that this much waits is let go. */
const MOST_WAITING_BYTES = 1_000_000;

/** Sends the frames of a mount point over one connection, second by second, with its faults, until the connection ends. */
export class CasterStream {
  private readonly frames: FrameSource;
  private readonly random: RandomGenerator;
  private readonly timer: NodeJS.Timeout;
  private second = 0;
  private sentFrames = 0;
  private sentBytes = 0;
  private place: { latitude: number; longitude: number } | null = null;

  constructor(
    private readonly socket: Socket,
    private readonly mountPoint: MountPointOptions,
    private readonly options: StreamOptions,
  ) {
    this.frames = framesOf(mountPoint, options.seed, options.startAt);
    this.random = randomOf(options.seed + 1);
    this.timer = setInterval(() => this.send(), options.secondMs);
    socket.once('close', () => clearInterval(this.timer));
    this.send();
  }

  /** A rover has said where it is. */
  locate(gga: string): void {
    const isFirst = this.place === null;
    this.place = readPosition(gga) ?? this.place;
    if (isFirst && this.place && this.wantsPosition()) this.send();
  }

  private wantsPosition(): boolean {
    return this.mountPoint.isNetwork === true || this.mountPoint.faults?.waitsForPosition === true;
  }

  private send(): void {
    const { faults = {}, isNetwork } = this.mountPoint;
    if (faults.silent || (this.wantsPosition() && !this.place)) return;
    if (faults.onlyGarbage) return this.write(this.garbage(200));
    for (const frame of this.frames(this.second++, isNetwork ? this.place : null)) {
      if (faults.noStation && frame.isStation) continue;
      if (this.sentFrames >= (faults.stallAfterFrames ?? Infinity)) return;
      if (this.sentFrames >= (faults.cutAfterFrames ?? Infinity)) return this.cut(frame.bytes);
      this.sentFrames++;
      if (faults.garbageBytes) this.write(this.garbage(faults.garbageBytes));
      this.write(this.damaged(frame.bytes, faults.badCrcEvery));
    }
  }

  /** Half a frame, and the end. */
  private cut(frame: Uint8Array): void {
    clearInterval(this.timer);
    this.write(frame.subarray(0, frame.length >> 1));
    this.socket.end();
  }

  private damaged(frame: Uint8Array, every: number | undefined): Uint8Array {
    if (every === undefined || this.sentFrames % every !== 0) return frame;
    const wrong = Uint8Array.from(frame);
    wrong[wrong.length - 1]! ^= 0xff;
    return wrong;
  }

  /** Never a preamble: what garbage with one in it does to a reader is a matter of the reader's own tests. */
  private garbage(length: number): Uint8Array {
    return Uint8Array.from({ length }, () => between(this.random, 0, 0xd2));
  }

  private write(bytes: Uint8Array): void {
    const { socket, mountPoint } = this;
    const room = (mountPoint.faults?.stallAfterBytes ?? Infinity) - this.sentBytes;
    if (room <= 0 || !socket.writable) return;
    if (socket.writableLength > MOST_WAITING_BYTES) return void socket.destroy();
    const sent = room < bytes.length ? bytes.subarray(0, room) : bytes;
    this.sentBytes += sent.length;
    // Each piece is a member of its own: RFC 1952 lets them follow one another.
    const body = this.options.isCompressed ? gzipSync(sent) : sent;
    if (!this.options.isChunked) socket.write(body);
    else
      socket.write(
        Buffer.concat([Buffer.from(`${body.length.toString(16)}\r\n`), body, Buffer.from('\r\n')]),
      );
  }
}
