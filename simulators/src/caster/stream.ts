import type { Socket } from 'node:net';
import { readPosition } from './position.js';
import { between, randomOf } from '../scenarios/random.js';
import { framesOf, type Frame, type FrameSource } from './frames.js';
import type { MountPointOptions } from './mount-point.js';

interface StreamOptions {
  isChunked: boolean;
  seed: number;
  secondMs: number;
}

/** Sends the frames of a mount point over one connection, second by second, with its faults. */
export class CasterStream {
  private readonly frames: FrameSource;
  private readonly random;
  private timer: NodeJS.Timeout | null = null;
  private second = 0;
  private sent = 0;
  private place: { latitude: number; longitude: number } | null = null;

  constructor(
    private readonly socket: Socket,
    private readonly mountPoint: MountPointOptions,
    private readonly options: StreamOptions,
  ) {
    this.frames = framesOf(mountPoint, options.seed);
    this.random = randomOf(options.seed + 1);
  }

  start(): void {
    this.send();
    this.timer = setInterval(() => this.send(), this.options.secondMs);
  }

  stop(): void {
    if (this.timer) clearInterval(this.timer);
    this.timer = null;
  }

  /** A rover has said where it is. */
  locate(gga: string): void {
    const wasWaiting = this.place === null;
    this.place = readPosition(gga) ?? this.place;
    if (wasWaiting && this.place && this.mountPoint.isNetwork) this.send();
  }

  private send(): void {
    const { faults = {}, isNetwork } = this.mountPoint;
    if (faults.silent || (isNetwork && !this.place)) return;
    if (faults.onlyGarbage) return this.write(this.garbage(200));
    for (const frame of this.frames(this.second++, isNetwork ? this.place : null)) {
      if (faults.noStation && frame.isStation) continue;
      if (faults.stallAfterFrames !== undefined && this.sent >= faults.stallAfterFrames) return;
      if (faults.cutAfterFrames !== undefined && this.sent >= faults.cutAfterFrames) {
        this.write(frame.bytes.subarray(0, frame.bytes.length >> 1));
        this.stop();
        this.socket.end();
        return;
      }
      this.sent++;
      if (faults.garbageBytes) this.write(this.garbage(faults.garbageBytes));
      this.write(this.damaged(frame, faults.badCrcEvery));
    }
  }

  private damaged({ bytes }: Frame, every: number | undefined): Uint8Array {
    if (every === undefined || this.sent % every !== 0) return bytes;
    const wrong = Uint8Array.from(bytes);
    wrong[wrong.length - 1]! ^= 0xff;
    return wrong;
  }

  /** Never a preamble: what garbage with one in it does to a reader is a matter of the reader's own tests. */
  private garbage(length: number): Uint8Array {
    return Uint8Array.from({ length }, () => between(this.random, 0, 0xd2));
  }

  private write(bytes: Uint8Array): void {
    if (this.socket.destroyed) return;
    if (!this.options.isChunked) this.socket.write(bytes);
    else {
      this.socket.write(`${bytes.length.toString(16)}\r\n`);
      this.socket.write(bytes);
      this.socket.write('\r\n');
    }
  }
}
