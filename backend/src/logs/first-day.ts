import { FrameReader, type FrameSink } from '@hubtack/contracts/nmea/frame-reader.js';
import { DAY_MS, readSentence, type DayNumber } from '@hubtack/contracts/nmea/sentence.js';
import { Dating, nearestTo } from '../fixes/dating.js';
import { FUTURE_SLACK_MS } from '../ingest/time-limits.js';

export interface FirstDay {
  day: DayNumber;
  from: 'sentences' | 'arrival';
}

/**
 * Finds the UTC day of the first sentence of a log before it is read, so that sentences need not be kept until a date comes.
 * From the first date in the log that can be trusted, back from instant to instant, as the assembler dates backwards. Without any,
 * from the arrival of the file: its last sentence is of the day nearest to it that is not in the future, because a file
 * holds the past.
 */
export class FirstDayFinder implements FrameSink {
  private readonly frames = new FrameReader();
  private readonly dating = new Dating();
  /** Times of day strung together, ms since the midnight before the first. */
  private first: number | null = null;
  private last = 0;
  private found: FirstDay | null = null;
  /** There are dates, trusted or not. */
  hasDates = false;

  constructor(private readonly receivedAt: number) {}

  /** Answers whether it has seen enough. */
  push(bytes: Uint8Array): boolean {
    this.frames.push(bytes, this);
    return this.found !== null;
  }

  /** Null when nothing in the log has a time of day. */
  finish(): FirstDay | null {
    this.frames.end(this);
    if (this.found || this.first === null) return this.found;
    let time = nearestTo(this.last, this.receivedAt);
    if (time > this.receivedAt + FUTURE_SLACK_MS) time -= DAY_MS;
    return { day: this.dayOfFirst(time), from: 'arrival' };
  }

  sentence(bytes: Uint8Array, start: number, end: number): void {
    if (this.found) return;
    const sentence = readSentence(bytes, start, end);
    if (sentence.type === 'gga') this.goOn(sentence.timeOfDayMs);
    else if (sentence.type === 'date') {
      this.hasDates ||= sentence.day !== null;
      this.goOn(sentence.timeOfDayMs);
      const time = this.dating.learn(sentence, this.receivedAt);
      if (time === null) return;
      this.found = { day: this.dayOfFirst(time), from: 'sentences' };
    }
  }

  fault(): void {}

  noise(): void {}

  private goOn(timeOfDayMs: number | null): void {
    if (timeOfDayMs === null) return;
    this.last = this.first === null ? timeOfDayMs : nearestTo(timeOfDayMs, this.last);
    this.first ??= timeOfDayMs;
  }

  private dayOfFirst(lastTime: number): DayNumber {
    return Math.floor((lastTime - (this.last - this.first!)) / DAY_MS);
  }
}
