import { DAY_MS, type Sentence } from '@hubtack/contracts/nmea/sentence.js';

/** Lines that go to the server together. */
export interface Post {
  /** UTC date of its first dated sentence, YYYY-MM-DD; null when nobody knows. */
  date: string | null;
  /** From its first to its newest instant, ms UTC; absent when they are not known. */
  span?: { from: number; to: number };
  body: Uint8Array;
}

const MOST_LINES = 500;
const MOST_BYTES = 200_000;

/** Gathers lines into posts. A full post is cut where the next instant begins, so that what belongs together stays so. */
export class PostBuilder {
  private lines: Uint8Array[] = [];
  private bytes = 0;
  private firstTimeOfDayMs: number | null = null;
  private lastTimeOfDayMs: number | null = null;
  private newest: number | null = null;

  get isEmpty(): boolean {
    return this.lines.length === 0;
  }

  /** Adds a line; answers a finished post when the line begins the next one. `newest`: ms UTC the log has got to, if known. */
  add(line: Uint8Array, sentences: readonly Sentence[], newest: number | null): Post | null {
    const times = sentences.map((sentence) => ('timeOfDayMs' in sentence ? sentence.timeOfDayMs : null));
    const time = times.find((timeOfDayMs) => timeOfDayMs !== null) ?? null;
    const begins = time !== null && time !== this.lastTimeOfDayMs;
    const isFull = this.lines.length >= MOST_LINES || this.bytes >= MOST_BYTES;
    const isOverfull = this.lines.length >= 2 * MOST_LINES || this.bytes >= 2 * MOST_BYTES;
    const finished = (isFull && begins) || isOverfull ? this.take() : null;
    this.lines.push(line);
    this.bytes += line.length;
    this.newest = newest ?? this.newest;
    this.firstTimeOfDayMs ??= time;
    this.lastTimeOfDayMs = time ?? this.lastTimeOfDayMs;
    return finished;
  }

  take(): Post | null {
    if (this.isEmpty) return null;
    const body = new Uint8Array(this.bytes);
    let offset = 0;
    for (const line of this.lines) {
      body.set(line, offset);
      offset += line.length;
    }
    const from = this.firstTime();
    const to = this.newest;
    this.lines = [];
    this.bytes = 0;
    this.firstTimeOfDayMs = null;
    this.lastTimeOfDayMs = null;
    this.newest = null;
    if (from === null || to === null) return { date: null, body };
    return { date: new Date(from).toISOString().slice(0, 10), span: { from, to }, body };
  }

  /** Counted back from the newest sentence: an RMC or ZDA within the post may be what first told the date. */
  private firstTime(): number | null {
    if (this.firstTimeOfDayMs === null || this.newest === null) return null;
    const day = Math.round((this.newest - this.firstTimeOfDayMs) / DAY_MS);
    return day * DAY_MS + this.firstTimeOfDayMs;
  }
}
