import type { CheckedStream } from '@hubtack/contracts/corrections/check.js';
import { RtcmFrameReader } from '@hubtack/contracts/rtcm/frame-reader.js';
import { constellationOf, messageName } from '@hubtack/contracts/rtcm/messages.js';
import { readStation, type Station } from '@hubtack/contracts/rtcm/station.js';

/** What comes over a correction stream, counted. Times are handed in, ms. */
export class StreamMeter {
  /** The newest 1005 or 1006. */
  station: Station | null = null;
  stations = 0;
  lastByteAt: number | null = null;
  private firstByteAt: number | null = null;
  private bytes = 0;
  private frames = 0;
  private badFrames = 0;
  private otherBytes = 0;
  private now = 0;
  private readonly times = new Map<number, { count: number; first: number; last: number }>();
  private readonly reader = new RtcmFrameReader({
    frame: (payload, number) => this.frame(payload, number),
    badCrc: () => this.badFrames++,
    noise: (bytes) => (this.otherBytes += bytes),
  });

  /** `startedAt`: when the stream was asked for. */
  constructor(private readonly startedAt: number) {}

  push(bytes: Uint8Array, now: number): void {
    this.now = now;
    this.firstByteAt ??= now;
    this.lastByteAt = now;
    this.bytes += bytes.length;
    this.reader.push(bytes);
  }

  get hasBytes(): boolean {
    return this.firstByteAt !== null;
  }

  private frame(payload: Uint8Array, number: number): void {
    this.frames++;
    const known = this.times.get(number);
    if (known) {
      known.count++;
      known.last = this.now;
    } else this.times.set(number, { count: 1, first: this.now, last: this.now });
    const station = readStation(payload);
    if (!station) return;
    this.station = station;
    this.stations++;
  }

  /** As it stands. The rate is over the time from the first byte on. */
  figures(now: number): CheckedStream {
    const overMs = this.firstByteAt === null ? 0 : Math.max(1, now - this.firstByteAt);
    const numbers = [...this.times.keys()].toSorted((a, b) => a - b);
    const constellations = numbers.map(constellationOf).filter((name) => name !== null);
    return {
      bytes: this.bytes,
      bytesPerSecond: overMs === 0 ? 0 : Math.round((this.bytes / overMs) * 10_000) / 10,
      firstByteMs: this.firstByteAt === null ? null : this.firstByteAt - this.startedAt,
      frames: this.frames,
      badFrames: this.badFrames,
      otherBytes: this.otherBytes,
      messages: numbers.map((number) => {
        const { count, first, last } = this.times.get(number)!;
        const intervalSeconds =
          count < 2 || last === first ? null : Math.round((last - first) / (count - 1) / 100) / 10;
        return { number, name: messageName(number), count, intervalSeconds };
      }),
      constellations: [...new Set(constellations)],
    };
  }
}
