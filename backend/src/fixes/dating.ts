import {
  DAY_MS,
  type DateSentence,
  type DayNumber,
  type TimeOfDayMs,
} from '@hubtack/contracts/nmea/sentence.js';

/** GPS week numbers roll over every 1024 weeks ("NMEA Revealed", week rollover): a date this far off is a device fault. */
const ROLLOVER_MS = 1024 * 7 * DAY_MS;
const ROLLOVER_SLACK_MS = 2 * DAY_MS;
/** Before this, a date that the receiver does not vouch for is its power-up default, not a date. */
const PLAUSIBLE_FROM = Date.UTC(2000, 0, 1);

/** The instant with this time of day nearest to `near`: within 12 h of it either way. */
export function nearestTo(timeOfDayMs: TimeOfDayMs, near: number): number {
  const day = Math.round((near - timeOfDayMs) / DAY_MS);
  return day * DAY_MS + timeOfDayMs;
}

const isRollover = (time: number, receivedAt: number): boolean =>
  Math.abs(receivedAt - time - ROLLOVER_MS) < ROLLOVER_SLACK_MS ||
  Math.abs(receivedAt - time - 2 * ROLLOVER_MS) < ROLLOVER_SLACK_MS;

/**
 * Gives the date that a GGA does not carry. In order of trust: the date the sender states with stored sentences,
 * the date in an RMC or ZDA of the same stream, the day that puts the time nearest to its arrival.
 * Once a date is known, the following sentences go on from it, midnight included.
 */
export class Dating {
  /** Stream time minus arrival time at the last dated sentence; null while only the clock is known. */
  private offsetMs: number | null = null;
  private readonly statedMs: number | null;
  /** What the device's own dates are worth beside a stated one; decided by the first of them. */
  private device: 'unknown' | 'agrees' | 'differs' = 'unknown';

  /** `statedDay`: UTC day of the first sentence, as the sender says. */
  constructor(statedDay: DayNumber | null = null) {
    this.statedMs = statedDay === null ? null : statedDay * DAY_MS;
  }

  /** Whether a date is known other than by the clock. */
  get isDated(): boolean {
    return this.offsetMs !== null || this.statedMs !== null;
  }

  /** Whether what comes in is of now, as far as is known. */
  isLive(slackMs: number): boolean {
    return this.statedMs === null && (this.offsetMs === null || Math.abs(this.offsetMs) < slackMs);
  }

  /** Dates a time of day, and remembers it as where the stream has got to. */
  date(timeOfDayMs: TimeOfDayMs, receivedAt: number): number {
    if (this.offsetMs !== null) {
      const time = nearestTo(timeOfDayMs, receivedAt + this.offsetMs);
      this.offsetMs = time - receivedAt;
      return time;
    }
    if (this.statedMs !== null) {
      const time = this.statedMs + timeOfDayMs;
      this.offsetMs = time - receivedAt;
      return time;
    }
    return nearestTo(timeOfDayMs, receivedAt);
  }

  /** How far the stream would jump at this time of day, ms. 0 while nothing is dated. */
  jumpMs(timeOfDayMs: TimeOfDayMs, receivedAt: number): number {
    if (this.offsetMs === null) return 0;
    return Math.abs(nearestTo(timeOfDayMs, receivedAt + this.offsetMs) - (receivedAt + this.offsetMs));
  }

  /**
   * Takes the date of an RMC or ZDA; answers the instant, or null when the date is not to be trusted:
   * none given, a power-up default, a week-number rollover, or against what the sender stated.
   */
  learn(sentence: DateSentence, receivedAt: number): number | null {
    if (sentence.day === null || sentence.timeOfDayMs === null || this.device === 'differs') return null;
    const time = sentence.day * DAY_MS + sentence.timeOfDayMs;
    if (!sentence.valid && time < PLAUSIBLE_FROM) return null;
    if (isRollover(time, receivedAt)) return null;
    if (this.statedMs !== null && this.device === 'unknown') {
      const expected =
        this.offsetMs === null ? this.statedMs + sentence.timeOfDayMs : receivedAt + this.offsetMs;
      this.device = Math.abs(time - expected) <= DAY_MS ? 'agrees' : 'differs';
      if (this.device === 'differs') return null;
    }
    this.offsetMs = time - receivedAt;
    return time;
  }
}
