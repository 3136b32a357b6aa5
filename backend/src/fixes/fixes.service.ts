import { Injectable } from '@nestjs/common';
import { fixStateOfQuality } from '@hubtack/contracts/fixes/fix-state.js';
import type { EpochSeries, TimelineAnswer } from '@hubtack/contracts/fixes/timeline.js';
import { Clock } from '../common/clock.js';
import type { Epoch } from './epoch.js';
import { EpochRepository } from './epoch.repository.js';
import { HOLD_MS, partition, totalsOf, type HeardSpan } from './timeline.js';
import { TrackStore } from './track.store.js';

/** Points that a chart of two hours can show. */
const MAX_POINTS = 720;

const iso = (time: number): string => new Date(time).toISOString();

@Injectable()
export class FixesService {
  constructor(
    private readonly tracks: TrackStore,
    private readonly epochRows: EpochRepository,
    private readonly clock: Clock,
  ) {}

  timeline(roverId: number, from: number, to: number): TimelineAnswer {
    const parts = partition(this.tracks.spansOf(roverId, from, to), from, to, this.clock.now());
    return {
      spans: parts.map(({ state, start, end }) => ({ state, start: iso(start), end: iso(end) })),
      totals: totalsOf(parts),
    };
  }

  /** Heard spans that overlap or touch [from, to]. */
  spans(roverId: number, from: number, to: number): HeardSpan[] {
    return this.tracks.spansOf(roverId, from, to);
  }

  /** The newest epoch, when one is kept still. */
  latest(roverId: number): Epoch | null {
    return this.tracks.get(roverId).latest;
  }

  /** Time of the newest epoch, ms UTC; null when never heard. */
  lastHeardAt(roverId: number): number | null {
    return this.tracks.get(roverId).tail?.lastTime ?? null;
  }

  /** Start of the first span ever, ms UTC; null when never heard. */
  firstHeardAt(roverId: number): number | null {
    return this.tracks.firstHeardAt(roverId);
  }

  /** Until when the newest epoch speaks for the rover, ms UTC; null when never heard. */
  heldUntil(roverId: number): number | null {
    const lastTime = this.lastHeardAt(roverId);
    return lastTime === null ? null : lastTime + HOLD_MS;
  }

  /** Whether the newest run is fixed; it may have run out (`heldUntil`). */
  isFixed(roverId: number): boolean {
    return this.tracks.get(roverId).tail?.state === 'fixed';
  }

  /** Stored epochs in [from, to), in order of time. */
  epochs(roverId: number, from: number, to: number): Epoch[] {
    return to > from ? this.epochRows.list(roverId, from, to) : [];
  }

  /** What tolerance is judged by, of the epochs in [from, to), in order of time. */
  judgedEpochs(roverId: number, from: number, to: number): ReturnType<EpochRepository['judged']> {
    return to > from ? this.epochRows.judged(roverId, from, to) : [];
  }

  /** Where a rover was, once in each half minute. */
  places(roverId: number, from: number, to: number): { time: number; latitude: number; longitude: number }[] {
    return to > from ? this.epochRows.places(roverId, from, to) : [];
  }

  /** Epochs of a window for a chart, every n-th so that there are at most MAX_POINTS. */
  series(roverId: number, from: number, to: number): EpochSeries {
    const epochs = this.epochRows.list(roverId, from, to);
    const every = Math.max(1, Math.ceil(epochs.length / MAX_POINTS));
    const points = epochs
      .filter((_, index) => (epochs.length - 1 - index) % every === 0)
      .map(({ time, quality, satellites, ageMs, hdop }) => ({
        at: time,
        state: fixStateOfQuality(quality),
        satellites,
        ageMs,
        hdop,
      }));
    return { points };
  }
}
