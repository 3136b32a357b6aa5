import type { Epoch } from '../fixes/epoch.js';
import type { EvidenceEpoch } from '../lost-fixes/diagnosis.js';

const CHUNK = 32_768;
const ABSENT = -1;
/** Beside the quality, one digit: a base station id was given. */
const HAS_STATION = 16;

const known = (value: number): number | null => (value === ABSENT ? null : value);

/** One chunk: a hundred megabytes of sentences are a million epochs, and objects of them would be hundreds of megabytes. */
class Chunk {
  readonly time = new Float64Array(CHUNK);
  readonly quality = new Uint8Array(CHUNK);
  readonly satellites = new Int16Array(CHUNK);
  readonly ageMs = new Int32Array(CHUNK);
  readonly hdop = new Float32Array(CHUNK);
}

/**
 * What the figures need of the epochs of a log, some twenty bytes each, in order of time and one for each instant once `settle` has
 * been called. The first that came for an instant stays.
 */
export class EpochColumns {
  private readonly chunks: Chunk[] = [];
  private added = 0;
  private isOrdered = true;
  private lastTime = -Infinity;
  /** Places in order of time; null while they are in order as they came. */
  private order: Uint32Array | null = null;
  /** Epochs, one for each instant; known after `settle`. */
  count = 0;

  add(epoch: Pick<Epoch, 'time' | 'quality' | 'satellites' | 'ageMs' | 'hdop' | 'stationId'>): void {
    const place = this.added % CHUNK;
    if (place === 0) this.chunks.push(new Chunk());
    const chunk = this.chunks.at(-1)!;
    chunk.time[place] = epoch.time;
    chunk.quality[place] = epoch.quality | (epoch.stationId === null ? 0 : HAS_STATION);
    chunk.satellites[place] = epoch.satellites ?? ABSENT;
    chunk.ageMs[place] = epoch.ageMs === null ? ABSENT : Math.min(epoch.ageMs, 0x7fffffff);
    chunk.hdop[place] = epoch.hdop ?? ABSENT;
    this.added++;
    // The same instant again, as when two talkers report, need not be kept to be known.
    if (epoch.time < this.lastTime) this.isOrdered = false;
    this.lastTime = epoch.time;
  }

  /** Puts what was added in order; answers how many were of an instant that was there already. */
  settle(): number {
    const order = new Uint32Array(this.added);
    for (let at = 0; at < order.length; at++) order[at] = at;
    // Places break ties, so that the first stays first.
    if (!this.isOrdered) order.sort((a, b) => this.timeAt(a) - this.timeAt(b) || a - b);
    let count = 0;
    for (const at of order)
      if (count === 0 || this.timeAt(at) !== this.timeAt(order[count - 1]!)) order[count++] = at;
    this.order = order;
    this.count = count;
    return this.added - count;
  }

  time(index: number): number {
    return this.timeAt(this.order![index]!);
  }

  quality(index: number): number {
    const at = this.order![index]!;
    return this.chunkOf(at).quality[at % CHUNK]! & ~HAS_STATION;
  }

  hasStation(index: number): boolean {
    const at = this.order![index]!;
    return (this.chunkOf(at).quality[at % CHUNK]! & HAS_STATION) !== 0;
  }

  satellites(index: number): number | null {
    const at = this.order![index]!;
    return known(this.chunkOf(at).satellites[at % CHUNK]!);
  }

  ageMs(index: number): number | null {
    const at = this.order![index]!;
    return known(this.chunkOf(at).ageMs[at % CHUNK]!);
  }

  hdop(index: number): number | null {
    const at = this.order![index]!;
    const hdop = known(this.chunkOf(at).hdop[at % CHUNK]!);
    // Single precision keeps seven digits; receivers write three or four.
    return hdop === null ? null : Number(hdop.toPrecision(6));
  }

  /** Without the station id itself: see `hasStation`. */
  epoch(index: number): EvidenceEpoch {
    return {
      time: this.time(index),
      quality: this.quality(index),
      satellites: this.satellites(index),
      ageMs: this.ageMs(index),
      hdop: this.hdop(index),
      stationId: null,
    };
  }

  /** Epochs in [start, end). */
  between(start: number, end: number): EvidenceEpoch[] {
    const found: EvidenceEpoch[] = [];
    for (let index = this.firstFrom(start); index < this.count && this.time(index) < end; index++)
      found.push(this.epoch(index));
    return found;
  }

  private chunkOf(at: number): Chunk {
    return this.chunks[Math.floor(at / CHUNK)]!;
  }

  private timeAt(at: number): number {
    return this.chunkOf(at).time[at % CHUNK]!;
  }

  private firstFrom(time: number): number {
    let [low, high] = [0, this.count];
    while (low < high) {
      const middle = (low + high) >> 1;
      if (this.time(middle) < time) low = middle + 1;
      else high = middle;
    }
    return low;
  }
}
