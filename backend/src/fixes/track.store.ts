import { Injectable } from '@nestjs/common';
import { EpochRepository } from './epoch.repository.js';
import { CHECKPOINT_MS, emptyTrack, type RoverTrack } from './rover-track.js';
import { SpanRepository } from './span.repository.js';
import { HOLD_MS, step, withTail, type HeardSpan } from './timeline.js';

/** The newest run of each rover, in memory; made again from the stored spans and the last minute of epochs. */
@Injectable()
export class TrackStore {
  private readonly tracks = new Map<number, RoverTrack>();

  constructor(
    private readonly epochs: EpochRepository,
    private readonly spans: SpanRepository,
  ) {}

  get(roverId: number): RoverTrack {
    let track = this.tracks.get(roverId);
    if (!track) {
      track = this.load(roverId);
      this.tracks.set(roverId, track);
    }
    return track;
  }

  set(roverId: number, track: RoverTrack): void {
    this.tracks.set(roverId, track);
  }

  firstHeardAt(roverId: number): number | null {
    return this.spans.first(roverId)?.start ?? this.get(roverId).tail?.start ?? null;
  }

  /** Spans that overlap or touch [from, to], the growing run as it really stands included. */
  spansOf(roverId: number, from: number, to: number): HeardSpan[] {
    return withTail(this.spans.window(roverId, from, to), this.get(roverId).tail, from, to);
  }

  /**
   * The stored row of the newest run lags by less than CHECKPOINT_MS of epochs, because the epoch that reaches it
   * writes the row in the same transaction: so that much is read again.
   */
  private load(roverId: number): RoverTrack {
    const row = this.spans.last(roverId);
    if (!row) return emptyTrack;
    const storedLastTime = row.end - HOLD_MS;
    let track: RoverTrack = {
      tail: { state: row.state, start: row.start, lastTime: storedLastTime },
      storedLastTime,
      latest: null,
    };
    for (const epoch of this.epochs.list(roverId, storedLastTime, storedLastTime + CHECKPOINT_MS + 1)) {
      track = { ...track, latest: epoch };
      if (epoch.time > storedLastTime) track = { ...track, tail: step(track.tail, epoch).tail };
    }
    return track;
  }
}
