import { FrameReader } from '@hubtack/contracts/nmea/frame-reader.js';
import { DAY_MS, readSentence, type Sentence } from '@hubtack/contracts/nmea/sentence.js';

/** The sentences in one line of bytes. */
export function sentencesIn(line: Uint8Array): Sentence[] {
  const found: Sentence[] = [];
  const reader = new FrameReader();
  const sink = {
    sentence: (bytes: Uint8Array, start: number, end: number) => found.push(readSentence(bytes, start, end)),
    fault: () => undefined,
    noise: () => undefined,
  };
  reader.push(line, sink);
  reader.end(sink);
  return found;
}

const HALF_DAY_MS = DAY_MS / 2;

/**
 * Follows the instant that a log has got to, line by line: from the stated date, the dates in RMC and ZDA, or the
 * clock of whoever reads a live receiver. Midnight is crossed where the time of day falls back.
 */
export class LogClock {
  /** ms UTC of the newest sentence; null before any, or while no date is known. */
  now: number | null = null;
  /** The newest line has a date other than the one counted on: what came before was dated wrongly, or long ago. */
  redated = false;
  private day: number | null;
  private lastTimeOfDay: number | null = null;

  /** `firstDay`: days since 1970 of the first sentence. A stated one stands against what the device says. */
  constructor(
    firstDay: number | null = null,
    private readonly isStated = false,
  ) {
    this.day = firstDay;
  }

  /** Takes a line; `readAt` is when it was read from a live receiver, null for a stored log. */
  take(sentences: readonly Sentence[], readAt: number | null): void {
    this.redated = false;
    for (const sentence of sentences) {
      if (sentence.type !== 'gga' && sentence.type !== 'date') continue;
      const { timeOfDayMs } = sentence;
      if (timeOfDayMs === null) continue;
      if (sentence.type === 'date' && sentence.day !== null && !this.isStated) {
        this.redated = this.day !== null && this.day !== sentence.day;
        this.day = sentence.day;
      } else if (this.day === null && readAt !== null) this.day = Math.round((readAt - timeOfDayMs) / DAY_MS);
      else if (this.day !== null && this.lastTimeOfDay !== null) {
        const step = timeOfDayMs - this.lastTimeOfDay;
        if (step < -HALF_DAY_MS) this.day++;
        else if (step > HALF_DAY_MS) this.day--;
      }
      this.lastTimeOfDay = timeOfDayMs;
      this.now = this.day === null ? null : this.day * DAY_MS + timeOfDayMs;
    }
  }
}

/** Day of the first sentence of a stored log: of its first RMC or ZDA, taken back over midnight where need be; null when it has none. */
export function firstDayOf(lines: Iterable<Uint8Array>): number | null {
  let firstTimeOfDay: number | null = null;
  for (const line of lines) {
    for (const sentence of sentencesIn(line)) {
      if (sentence.type !== 'gga' && sentence.type !== 'date') continue;
      firstTimeOfDay ??= sentence.timeOfDayMs;
      if (sentence.type !== 'date' || sentence.day === null || sentence.timeOfDayMs === null) continue;
      const wentOverMidnight = firstTimeOfDay !== null && firstTimeOfDay - sentence.timeOfDayMs > HALF_DAY_MS;
      return wentOverMidnight ? sentence.day - 1 : sentence.day;
    }
  }
  return null;
}
