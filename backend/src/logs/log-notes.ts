import { DAY_MS, type DayNumber } from '@hubtack/contracts/nmea/sentence.js';
import type { LogQuestion } from './analyse-log.js';

/** Loggers pause for a weekend or a fortnight; a leap longer than this is worth a word. */
const LEAP_MS = 30 * DAY_MS;
const MOST_LEAPS = 5;

interface Counted extends Pick<LogQuestion, 'firstDay' | 'hasDates'> {
  sentences: number;
  ggaSentences: number;
  epochs: number;
  /** Losses that are not listed; null: they were not looked for. */
  moreLosses: number | null;
}

const dayOf = (time: number): string => new Date(time).toISOString().slice(0, 10);
const times = (count: number, what: string): string => `${count} ${what}${count === 1 ? '' : 's'}`;

/** What a reader of a log's figures should know, gathered while it is read. */
export class LogNotes {
  private readonly leaps: string[] = [];
  private moreLeaps = 0;
  private lastTime: number | null = null;
  private otherDay: DayNumber | null = null;

  /** The file has been read, and nothing in it begins like a sentence. */
  nothingFound(): string {
    return 'There is no sentence in it. A log is plain text with lines such as $GNGGA,… as a receiver writes them.';
  }

  /** A date that a sentence has. */
  date(day: DayNumber, firstDay: LogQuestion['firstDay']): void {
    if (firstDay?.from !== 'given' || this.lastTime !== null || this.otherDay !== null) return;
    if (Math.abs(day - firstDay.day) > 1) this.otherDay = day;
  }

  epoch(time: number, line: number): void {
    const before = this.lastTime;
    this.lastTime = time;
    if (before === null || Math.abs(time - before) <= LEAP_MS) return;
    if (this.leaps.length < MOST_LEAPS)
      this.leaps.push(`The date leaps from ${dayOf(before)} to ${dayOf(time)} at line ${line}.`);
    else this.moreLeaps++;
  }

  of({ firstDay, hasDates, sentences, ggaSentences, epochs, moreLosses }: Counted): string[] {
    const notes: string[] = [];
    if (ggaSentences === 0)
      notes.push(
        `None of its ${times(sentences, 'sentence')} is a GGA that can be read: quality, and so fix time, comes from GGA alone.`,
      );
    if (epochs > 0 && firstDay?.from === 'arrival')
      notes.push(
        `${hasDates ? 'The dates in the sentences cannot be trusted' : 'The sentences have no date'}, so its last one was taken to be of the day on which the file came. Times of day are right; give the date of the first sentence to have the day right.`,
      );
    if (this.otherDay !== null)
      notes.push(`The sentences say ${dayOf(this.otherDay * DAY_MS)}; the date that was given counts.`);
    notes.push(...this.leaps);
    if (this.moreLeaps > 0) notes.push(`The date leaps ${times(this.moreLeaps, 'more time')}.`);
    if (moreLosses === null) notes.push('The state changes too often in it to tell losses apart.');
    else if (moreLosses > 0)
      notes.push(`${times(moreLosses, 'further loss').replace('losss', 'losses')} not listed.`);
    return notes;
  }
}
