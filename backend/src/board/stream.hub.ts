import { randomUUID } from 'node:crypto';
import { MetricsService } from '../metrics/metrics.service.js';
import {
  eventText,
  hasMoved,
  lanesEventOf,
  lostFixEventOf,
  type Audience,
  type LaneSource,
  type LostFixSource,
  type Moved,
} from './frame.js';
import { StreamHistory } from './stream.history.js';
import type { StreamReader } from './stream.reader.js';

/** Silence after which a `beat` goes out. */
const BEAT_MS = 10_000;
/** A reader that has not caught up for this long is closed; its browser comes back by itself. */
const MAX_LAG_MS = 15_000;

/** Sends frames to readers. Each frame is serialised once for each audience, however many read it. */
export class StreamHub {
  private readonly history = new StreamHistory(randomUUID());
  private readonly readers = new Set<StreamReader>();

  constructor(
    private readonly lanes: LaneSource,
    private readonly lostFixes: LostFixSource,
    private readonly metrics: MetricsService,
  ) {}

  get cursor(): string {
    return this.history.cursor;
  }

  /** Brings a new reader up to the newest frame from its cursor, then lets it follow: no gap, no repeat. */
  join(reader: StreamReader, cursor: string | undefined, now: number): void {
    const place = cursor === undefined ? null : this.history.placeOf(cursor);
    if (place === null) {
      reader.place = this.history.newest;
      reader.write(eventText('reset', { cursor: this.cursor }, this.cursor), now);
    } else {
      reader.place = place;
      reader.write(eventText('beat', { serverTime: now }), now);
      this.catchUp(reader, now);
    }
    this.readers.add(reader);
    this.metrics.streamReaders.set(this.readers.size);
  }

  leave(reader: StreamReader): void {
    this.readers.delete(reader);
    this.metrics.streamReaders.set(this.readers.size);
  }

  /** Makes what moved the next frame. */
  publish(moved: Moved, ribbons: ReadonlySet<number>, now: number): void {
    if (!hasMoved(moved)) return;
    this.history.add(moved, ribbons);
    const frames = new Map<Audience, Buffer | null>();
    for (const reader of this.readers) {
      if (reader.laggingSince !== null) continue;
      let frame = frames.get(reader.audience);
      if (frame === undefined) {
        frame = this.frameFor(reader.audience, moved, ribbons, now);
        frames.set(reader.audience, frame);
      }
      reader.place = this.history.newest;
      if (frame) reader.write(frame, now);
    }
  }

  /** A slow reader has read what it had: it gets the newest state of all that moved meanwhile, in one frame. */
  drained(reader: StreamReader, now: number): void {
    if (reader.laggingSince === null) return;
    reader.laggingSince = null;
    this.catchUp(reader, now);
  }

  /** Beats for silent streams, an end for those whose time is over, and for those that do not read. */
  sweep(now: number): void {
    const beat = Buffer.from(eventText('beat', { serverTime: now }));
    let lagging = 0;
    for (const reader of this.readers) {
      if (now >= reader.endsAt) reader.end();
      else if (reader.laggingSince !== null) {
        lagging++;
        if (now - reader.laggingSince > MAX_LAG_MS) reader.destroy();
      } else if (now - reader.lastWriteAt >= BEAT_MS) reader.write(beat, now);
    }
    this.metrics.streamLagging.set(lagging);
  }

  /** Ends the streams of these sign-ins: what they may see has changed, or they are over. */
  endSessions(sessionIds: readonly string[]): void {
    for (const reader of this.readers) if (sessionIds.includes(reader.sessionId)) reader.end();
  }

  /** To the open boards of one person. */
  tell(userId: number, event: string, now: number): void {
    for (const reader of this.readers)
      if (reader.userId === userId && reader.laggingSince === null) reader.write(event, now);
  }

  endAll(): void {
    for (const reader of this.readers) reader.end();
  }

  private catchUp(reader: StreamReader, now: number): void {
    const missed = this.history.since(reader.place);
    reader.place = this.history.newest;
    if (missed === null) {
      reader.write(eventText('reset', { cursor: this.cursor }, this.cursor), now);
      return;
    }
    const frame = this.frameFor(reader.audience, missed.moved, missed.ribbons, now);
    if (frame) reader.write(frame, now);
  }

  private frameFor(
    audience: Audience,
    moved: Moved,
    ribbons: ReadonlySet<number>,
    now: number,
  ): Buffer | null {
    const lanes = lanesEventOf(audience, moved, ribbons, this.lanes, now);
    const lostFixes = lostFixEventOf(audience, moved, this.lostFixes, now);
    // Lanes first: a lost fix is shown on a lane that is there. Only the last carries the cursor: whoever was cut off between them resumes
    // before both.
    const text =
      (lanes ? eventText('lanes', lanes, lostFixes ? undefined : this.cursor) : '') +
      (lostFixes ? eventText('lost-fix', lostFixes, this.cursor) : '');
    return text === '' ? null : Buffer.from(text);
  }
}
