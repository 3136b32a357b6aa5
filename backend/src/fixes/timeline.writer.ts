import { Injectable } from '@nestjs/common';
import { Clock } from '../common/clock.js';
import type { Epoch, LateSigmas } from './epoch.js';
import { EpochRepository } from './epoch.repository.js';
import { FiguresToDo } from './figures-to-do.repository.js';
import { stretchesOf, type LateStretch } from './late-epochs.js';
import { CHECKPOINT_MS, type RoverTrack } from './rover-track.js';
import { SpanRepository } from './span.repository.js';
import {
  HOLD_MS,
  clipSpans,
  spanOfTail,
  spansOf,
  splice,
  step,
  withTail,
  type HeardSpan,
} from './timeline.js';
import { TrackStore } from './track.store.js';

/** Older than this when it comes, a sentence was stored somewhere; what is younger, today's figures take in by themselves. */
export const STORED_MS = 10 * 60_000;

export interface Written {
  accepted: number;
  duplicates: number;
}

/** What one group of writes did to a rover. */
export interface RoverChange {
  roverId: number;
  track: RoverTrack;
  /** Runs began, ended or were corrected (the newest one merely growing does not count). */
  spansChanged: boolean;
  /** Earliest epoch that was accepted; null while there is none. */
  from: number | null;
  accepted: number;
}

/**
 * Writes epochs and moves the timeline. All calls between `begin` and `changes` belong to one transaction of the
 * caller's; tracks change in memory only after `changes` has been called on its success, so undoing is forgetting.
 */
@Injectable()
export class TimelineWriter {
  private touched = new Map<number, RoverChange>();
  private late = new Map<number, number[]>();
  /** Times of sentences that came in order, but old. */
  private stored = new Map<number, number[]>();

  constructor(
    private readonly epochs: EpochRepository,
    private readonly spans: SpanRepository,
    private readonly tracks: TrackStore,
    private readonly toDo: FiguresToDo,
    private readonly clock: Clock,
  ) {}

  begin(): void {
    this.touched = new Map();
    this.late = new Map();
    this.stored = new Map();
  }

  write(roverId: number, epochs: readonly Epoch[], sigmas: readonly LateSigmas[]): Written {
    const change = this.changeOf(roverId);
    const storedBefore = this.clock.now() - STORED_MS;
    const written: Written = { accepted: 0, duplicates: 0 };
    for (const epoch of epochs) {
      if (this.epochs.insert(roverId, epoch)) {
        written.accepted++;
        change.from = Math.min(change.from ?? Infinity, epoch.time);
        const { tail } = change.track;
        if (tail !== null && epoch.time <= tail.lastTime) addTo(this.late, roverId, epoch.time);
        else {
          this.advance(change, epoch);
          if (epoch.time < storedBefore) addTo(this.stored, roverId, epoch.time);
        }
      } else written.duplicates++;
    }
    for (const late of sigmas) this.epochs.addSigmas(roverId, late);
    change.accepted += written.accepted;
    return written;
  }

  /** Works the late stretches out again; the last thing before the commit. */
  settleLate(): void {
    this.noteStored();
    for (const [roverId, times] of this.late) {
      const change = this.changeOf(roverId);
      for (const stretch of stretchesOf(times, 2 * HOLD_MS)) {
        this.correct(change, stretch);
        this.toDo.add({ roverId, start: stretch.first, end: stretch.last + HOLD_MS });
      }
    }
  }

  /** Sentences that were stored while out of coverage come in order, and change figures of the past all the same. */
  private noteStored(): void {
    for (const [roverId, times] of this.stored)
      for (const { first, last } of stretchesOf(times, 2 * HOLD_MS))
        this.toDo.add({ roverId, start: first, end: last + HOLD_MS });
  }

  /** The commit held: tracks move, and the caller tells others. */
  commit(): RoverChange[] {
    for (const change of this.touched.values()) this.tracks.set(change.roverId, change.track);
    return [...this.touched.values()].filter((change) => change.accepted > 0);
  }

  private changeOf(roverId: number): RoverChange {
    let change = this.touched.get(roverId);
    if (!change) {
      change = { roverId, track: this.tracks.get(roverId), spansChanged: false, from: null, accepted: 0 };
      this.touched.set(roverId, change);
    }
    return change;
  }

  private advance(change: RoverChange, epoch: Epoch): void {
    const { roverId, track } = change;
    const { tail, closed } = step(track.tail, epoch);
    let { storedLastTime } = track;
    if (track.tail === null || closed) {
      if (closed) this.spans.setEnd(roverId, closed.start, closed.end);
      this.spans.insert(roverId, spanOfTail(tail));
      storedLastTime = tail.lastTime;
      change.spansChanged = true;
    } else if (tail.lastTime - storedLastTime >= CHECKPOINT_MS) {
      this.spans.setEnd(roverId, tail.start, tail.lastTime + HOLD_MS);
      storedLastTime = tail.lastTime;
    }
    change.track = { tail, storedLastTime, latest: epoch };
  }

  /** Late epochs change what was known over [first, last + H), and nothing else (see `splice`). */
  private correct(change: RoverChange, stretch: LateStretch): void {
    const { roverId, track } = change;
    const tail = track.tail!;
    const window = { start: stretch.first, end: stretch.last + HOLD_MS };
    const before = withTail(
      this.spans.window(roverId, window.start, window.end),
      tail,
      window.start,
      window.end,
    );
    const epochs = this.epochs.qualities(roverId, window.start, window.end);
    const after = splice(before, window, clipSpans(spansOf(epochs), window.start, window.end));
    this.replace(roverId, before, after);
    if (before.at(-1)?.start === tail.start) {
      const { state, start } = after.at(-1)!;
      const { lastTime } = tail;
      change.track = { ...track, tail: { state, start, lastTime }, storedLastTime: lastTime };
    }
    change.spansChanged = true;
  }

  private replace(roverId: number, before: readonly HeardSpan[], after: readonly HeardSpan[]): void {
    for (const span of before) this.spans.delete(roverId, span.start);
    for (const span of after) this.spans.insert(roverId, span);
  }
}

function addTo(lists: Map<number, number[]>, roverId: number, time: number): void {
  const times = lists.get(roverId);
  if (times) times.push(time);
  else lists.set(roverId, [time]);
}
