import { FrameReader, type FrameFault, type FrameSink } from '@hubtack/contracts/nmea/frame-reader.js';
import { DAY_MS, readSentence, type DayNumber } from '@hubtack/contracts/nmea/sentence.js';
import type { LogDetail, LogSummary } from '@hubtack/contracts/logs/log.js';
import type { Limits } from '@hubtack/contracts/lost-fixes/limits.js';
import { baseDistance } from '../common/base-distance.js';
import { EpochAssembler } from '../fixes/epoch.assembler.js';
import type { Epoch } from '../fixes/epoch.js';
import type { TimeLimits } from '../ingest/time-limits.js';
import { EpochColumns } from './epoch-columns.js';
import { figuresOf } from './log-figures.js';
import { lossesOf } from './log-losses.js';
import type { EpochBatch, RefusedEpochs } from './log-messages.js';
import { LogNotes } from './log-notes.js';
import { lineText, RejectedLines } from './rejected-lines.js';
import { Refusals } from './refusals.js';

export interface LogQuestion {
  /** UTC day of the first sentence, and where it was taken from; null when nothing has a time. */
  firstDay: { day: DayNumber; from: NonNullable<LogDetail['dateFrom']> } | null;
  /** The sentences have dates, whether they could be trusted or not. */
  hasDates: boolean;
  /** When the file came, ms UTC. */
  receivedAt: number;
  limits: Limits;
  base: { latitude: number; longitude: number } | null;
  /** What may enter a rover's history; null: nothing is to. */
  history: TimeLimits | null;
}

export type LogAnswer =
  | { kind: 'done'; summary: LogSummary; detail: LogDetail; refused: RefusedEpochs }
  | { kind: 'failed'; problem: string };

/**
 * Reads a log as its bytes come, by the reader, assembler and timeline of the ingest, so that a log says what the live board said. What it
 * keeps in memory is bounded, but for some twenty bytes an epoch.
 */
export class LogAnalysis implements FrameSink {
  private readonly frames = new FrameReader();
  private readonly assembler: EpochAssembler;
  private readonly columns = new EpochColumns();
  private readonly rejected = new RejectedLines();
  private readonly notes = new LogNotes();
  private readonly refusals: Refusals;
  private batch: EpochBatch = { epochs: [], sigmas: [] };
  private readonly counts = {
    sentences: 0,
    ggaSentences: 0,
    badChecksum: 0,
    malformed: 0,
    ignored: 0,
    untimed: 0,
  };
  /** Texts of GGAs without a time, until it is known whether something else says it. */
  private readonly timeless = new Map<number, string>();
  private newestPlace: Pick<Epoch, 'time' | 'latitude' | 'longitude'> | null = null;

  constructor(private readonly question: LogQuestion) {
    // A log is stored, never live: with a stated day no GGA is placed at the arrival of the file.
    const arrivalDay = Math.floor(question.receivedAt / DAY_MS);
    this.assembler = new EpochAssembler(question.firstDay?.day ?? arrivalDay);
    this.refusals = new Refusals(question.history);
  }

  /** Answers what may enter the rover's history. */
  push(bytes: Uint8Array): EpochBatch {
    this.frames.push(bytes, this);
    return this.take();
  }

  /** The last that may enter the history; `answer` comes after it. */
  finish(): EpochBatch {
    this.frames.end(this);
    this.assembler.finish();
    return this.take();
  }

  answer(): LogAnswer {
    const { columns, counts, question, rejected } = this;
    if (counts.sentences === 0) return { kind: 'failed', problem: this.notes.nothingFound() };
    const duplicates = columns.settle();
    const figures = figuresOf(columns);
    const { limits } = question;
    const found =
      figures.spans && lossesOf(columns, figures.spans, figures, { limits, baseDistanceM: this.distance() });
    return {
      kind: 'done',
      summary: { ...counts, epochs: columns.count, duplicates, ...figures.summary },
      detail: {
        ...figures.detail,
        losses: found?.losses ?? [],
        rejected: rejected.listed.toSorted((a, b) => a.line - b.line),
        moreRejected: rejected.more,
        dateFrom: columns.count === 0 ? null : (question.firstDay?.from ?? null),
        notes: this.notes.of({
          ...question,
          ...counts,
          epochs: columns.count,
          moreLosses: found?.more ?? null,
        }),
        history: null,
      },
      refused: this.refusals.inWords(),
    };
  }

  sentence(bytes: Uint8Array, start: number, end: number, line: number): void {
    this.counts.sentences++;
    const sentence = readSentence(bytes, start, end);
    const { type } = sentence;
    if (type === 'fault') {
      this.counts.malformed++;
      this.rejected.add(line, sentence.code, sentence.detail, () => lineText(bytes, start - 1));
      return;
    }
    if (type === 'other') {
      this.counts.ignored++;
      return;
    }
    if (type === 'gga') {
      this.counts.ggaSentences++;
      if (sentence.timeOfDayMs === null && !this.rejected.isFull)
        this.timeless.set(line, lineText(bytes, start - 1));
    }
    if (type === 'date' && sentence.day !== null) this.notes.date(sentence.day, this.question.firstDay);
    this.assembler.push(sentence, line, this.question.receivedAt);
  }

  fault(code: FrameFault, detail: string, line: number, bytes: Uint8Array, dollar: number): void {
    this.counts.sentences++;
    if (code === 'badChecksum') this.counts.badChecksum++;
    else this.counts.malformed++;
    this.rejected.add(line, code, detail, () => lineText(bytes, dollar));
  }

  noise(): void {
    this.counts.ignored++;
  }

  private take(): EpochBatch {
    const { epochs, sigmas, untimed } = this.assembler.take();
    for (const line of untimed) {
      this.counts.untimed++;
      const text = this.timeless.get(line) ?? '';
      this.rejected.add(line, 'untimed', 'no time in the sentence, and none beside it', () => text);
    }
    // The newest may still be waiting.
    const newest = [...this.timeless.keys()].at(-1);
    for (const line of this.timeless.keys()) if (line !== newest) this.timeless.delete(line);
    for (const { epoch, line } of epochs) this.takeEpoch(epoch, line);
    const { batch } = this;
    this.batch = { epochs: [], sigmas: [] };
    if (this.question.history) batch.sigmas = sigmas;
    return batch;
  }

  private takeEpoch(epoch: Epoch, line: number): void {
    this.columns.add(epoch);
    this.notes.epoch(epoch.time, line);
    if (epoch.latitude !== null && epoch.time >= (this.newestPlace?.time ?? -Infinity))
      this.newestPlace = { time: epoch.time, latitude: epoch.latitude, longitude: epoch.longitude };
    if (this.refusals.allows(epoch.time)) this.batch.epochs.push(epoch);
  }

  private distance(): number | null {
    const { base } = this.question;
    const place = this.newestPlace;
    if (!base || place?.latitude == null || place.longitude === null) return null;
    return baseDistance(place.latitude, place.longitude, base.latitude, base.longitude);
  }
}
