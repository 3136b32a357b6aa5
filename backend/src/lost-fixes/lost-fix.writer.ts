import { Injectable } from '@nestjs/common';
import { endingWords, lostFixKindWords, type Ending } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { DateTime } from 'luxon';
import { Clock } from '../common/clock.js';
import { SettingsService } from '../settings/settings.service.js';
import type { Episode } from './detector.js';
import { LostFixRepository, type LostFixChange, type NewLostFix } from './lost-fix.repository.js';
import type { LostFixRow } from './lost-fix.view.js';

/** Writes lost fixes together with their history, and remembers which ones it touched. Calls belong to one transaction of the caller's. */
@Injectable()
export class LostFixWriter {
  private touched = new Set<number>();

  constructor(
    private readonly lostFixes: LostFixRepository,
    private readonly settings: SettingsService,
    private readonly clock: Clock,
  ) {}

  /** Ids touched since the last call. */
  takeTouched(): number[] {
    const ids = [...this.touched];
    this.touched = new Set();
    return ids;
  }

  raise(values: NewLostFix): number {
    const id = this.lostFixes.insert(values);
    this.note(
      id,
      'raised',
      `${lostFixKindWords[values.kind]} since ${this.clockTime(values.startAt)}`,
      values.raisedAt,
    );
    if (values.endAt != null && values.ending) this.noteEnd(id, values.endAt, values.ending);
    this.touched.add(id);
    return id;
  }

  change(id: number, change: LostFixChange): void {
    this.lostFixes.update(id, change);
    this.touched.add(id);
  }

  /** A row follows its episode; what people added stays. Answers whether anything changed. */
  follow(row: LostFixRow, episode: Episode, isPaused: boolean): boolean {
    const { kind, start: startAt, raisedAt, end: endAt, ending } = episode;
    // While a pause lasts, its minutes are written once it is over.
    const pausedMs = endAt === null && isPaused ? row.pausedMs : episode.pausedMs;
    const next = { kind, startAt, raisedAt, endAt, ending, pausedMs };
    const isSame = Object.entries(next).every(([name, value]) => row[name as keyof typeof next] === value);
    if (isSame) return false;
    this.change(row.id, next);
    if (row.kind === 'flag')
      this.note(row.id, 'raised', `${lostFixKindWords[kind]} since ${this.clockTime(startAt)}`);
    else if (row.ending === 'withdrawn') this.note(row.id, 'opened', 'It was there after all');
    else if (row.endAt !== null && endAt === null)
      this.note(row.id, 'opened', 'Not over: the fix did not hold');
    else if (row.startAt !== startAt || (row.endAt !== null && row.endAt !== endAt))
      this.note(
        row.id,
        'corrected',
        `Sentences that came late: from ${this.clockTime(startAt)} to ${this.clockTime(endAt)}`,
      );
    if (endAt !== null && ending !== null && row.endAt === null) this.noteEnd(row.id, endAt, ending);
    return true;
  }

  end(id: number, endAt: number, ending: Ending): void {
    this.change(id, { endAt, ending });
    this.noteEnd(id, endAt, ending);
  }

  withdraw(row: LostFixRow): void {
    this.change(row.id, { endAt: row.endAt ?? this.clock.now(), ending: 'withdrawn' });
    this.note(row.id, 'withdrawn', endingWords.withdrawn);
  }

  note(
    id: number,
    kind: Parameters<LostFixRepository['addHistory']>[1]['kind'],
    text: string,
    at = this.clock.now(),
  ): void {
    this.lostFixes.addHistory(id, { at, by: null, kind, text });
    this.touched.add(id);
  }

  private noteEnd(id: number, at: number, ending: Ending): void {
    this.note(id, 'ended', endingWords[ending], at);
  }

  private clockTime(at: number | null): string {
    if (at === null) return 'now';
    return DateTime.fromMillis(at, { zone: this.settings.get().timeZone }).toFormat('HH:mm:ss');
  }
}
