import { FrameReader } from '@hubtack/contracts/nmea/frame-reader.js';
import { DAY_MS, readSentence, type DateSentence, type Sentence } from '@hubtack/contracts/nmea/sentence.js';

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
/** Before this, a date that the receiver does not vouch for is its power-up default, not a date. */
const PLAUSIBLE_FROM_DAY = Date.UTC(2000, 0, 1) / DAY_MS;
/** GPS week numbers roll over every 1024 weeks ("NMEA Revealed", week rollover). */
const ROLLOVER_DAYS = 1024 * 7;

/** The day an RMC or ZDA tells; null when it tells none, or one that is known to be a fault. */
function dayOf({ day, valid }: DateSentence, readAt: number | null): number | null {
  if (day === null || (!valid && day < PLAUSIBLE_FROM_DAY)) return null;
  if (readAt === null) return day;
  const behind = Math.round(readAt / DAY_MS) - day;
  const isRollover = [1, 2].some((times) => Math.abs(behind - times * ROLLOVER_DAYS) <= 2);
  return isRollover ? null : day;
}

/**
 * Follows the instant that a log has got to, line by line: from the stated date, the dates in RMC and ZDA, or the
 * clock of whoever reads a live receiver. Midnight is crossed where the time of day falls back.
 */
export class LogClock {
  /** ms UTC of the newest sentence; null before any, or while no date is known. */
  now: number | null = null;
  /** The newest line has a date other than the one counted on: what came before was dated wrongly, or long ago. */
  redated = false;
  /** A date was given from outside or by the receiver, so the reader's clock tells only how much time has gone by. */
  private isDated: boolean;
  private lastReadAt: number | null = null;

  /** `firstDay`: days since 1970 of the first sentence. A stated one stands against what the device says. */
  constructor(
    private readonly firstDay: number | null = null,
    private readonly isStated = false,
  ) {
    this.isDated = firstDay !== null;
  }

  /** Takes a line; `readAt` is when it was read from a live receiver, null for a stored log. */
  take(sentences: readonly Sentence[], readAt: number | null): void {
    this.redated = false;
    for (const sentence of sentences) {
      if (sentence.type !== 'gga' && sentence.type !== 'date') continue;
      const { timeOfDayMs } = sentence;
      if (timeOfDayMs === null) continue;
      const counted = this.countedDay(timeOfDayMs, readAt);
      const told = sentence.type === 'date' && !this.isStated ? dayOf(sentence, readAt) : null;
      this.redated ||= counted !== null && told !== null && counted !== told;
      this.isDated ||= told !== null;
      const day = told ?? counted;
      this.now = day === null ? null : day * DAY_MS + timeOfDayMs;
      this.lastReadAt = readAt;
    }
  }

  /** The day that puts this time of day nearest to where the log should have got to. */
  private countedDay(timeOfDayMs: number, readAt: number | null): number | null {
    if (!this.isDated && readAt !== null) return Math.round((readAt - timeOfDayMs) / DAY_MS);
    if (this.now === null) return this.firstDay;
    // A receiver that was off for a night does not tell by its time of day that a day went by; the reader's clock does.
    const elapsed = readAt !== null && this.lastReadAt !== null ? readAt - this.lastReadAt : 0;
    return Math.round((this.now + elapsed - timeOfDayMs) / DAY_MS);
  }
}

/** Day of the first sentence of a stored log: of its first RMC or ZDA, taken back over midnight where need be; null when it has none. */
export function firstDayOf(lines: Iterable<Uint8Array>): number | null {
  let firstTimeOfDay: number | null = null;
  for (const line of lines) {
    for (const sentence of sentencesIn(line)) {
      if (sentence.type !== 'gga' && sentence.type !== 'date') continue;
      firstTimeOfDay ??= sentence.timeOfDayMs;
      const day = sentence.type === 'date' ? dayOf(sentence, null) : null;
      if (day === null || sentence.timeOfDayMs === null) continue;
      const wentOverMidnight = firstTimeOfDay !== null && firstTimeOfDay - sentence.timeOfDayMs > HALF_DAY_MS;
      return wentOverMidnight ? day - 1 : day;
    }
  }
  return null;
}
