import type { IngestAnswer, RejectReason } from '@hubtack/contracts/ingest/ingest.js';
import { FrameReader, type FrameSink } from '@hubtack/contracts/nmea/frame-reader.js';
import { readSentence, type DayNumber } from '@hubtack/contracts/nmea/sentence.js';
import type { Epoch, LateSigmas } from '../fixes/epoch.js';
import { EpochAssembler } from '../fixes/epoch.assembler.js';
import { refusalOf, type TimeLimits } from './time-limits.js';

/** The answer names the first so many reasons; all are counted. */
export const MAX_REASONS = 20;

export interface Reject {
  line: number;
  code: RejectReason;
  detail: string;
}

/** What was read of a stretch of bytes. `readable` counts right sentences, needed or not. */
export interface ReadOut {
  epochs: Epoch[];
  sigmas: LateSigmas[];
  readable: number;
  ignored: number;
  rejects: Reject[];
}

const emptyReadOut = (): ReadOut => ({ epochs: [], sigmas: [], readable: 0, ignored: 0, rejects: [] });

/** Bytes of one stream become dated epochs, and reasons for what did not: framing, reading and assembling wired together. */
export class SentenceBatch implements FrameSink {
  private readonly frames = new FrameReader();
  private readonly assembler: EpochAssembler;
  private out = emptyReadOut();
  private receivedAt = 0;

  constructor(statedDay: DayNumber | null = null) {
    this.assembler = new EpochAssembler(statedDay);
  }

  push(bytes: Uint8Array, receivedAt: number): void {
    this.receivedAt = receivedAt;
    this.frames.push(bytes, this);
  }

  /** For a live stream: hands on what need not wait; answers whether something still waits for its date. */
  settle(now: number): boolean {
    return this.assembler.settle(now);
  }

  finish(): void {
    this.frames.end(this);
    this.assembler.finish();
  }

  /** What has been read since the last call, without what the limits refuse. */
  take(limits: TimeLimits): ReadOut {
    const { out } = this;
    this.out = emptyReadOut();
    const assembled = this.assembler.take();
    for (const line of assembled.untimed)
      out.rejects.push({ line, code: 'untimed', detail: 'no time in the sentence, and it is not live' });
    for (const { epoch, line } of assembled.epochs) {
      const refusal = refusalOf(epoch.time, limits);
      if (refusal) out.rejects.push({ line, ...refusal });
      else out.epochs.push(epoch);
    }
    out.sigmas = assembled.sigmas;
    out.rejects.sort((a, b) => a.line - b.line);
    return out;
  }

  sentence(bytes: Uint8Array, start: number, end: number, line: number): void {
    const sentence = readSentence(bytes, start, end);
    if (sentence.type === 'fault') {
      this.out.rejects.push({ line, code: sentence.code, detail: sentence.detail });
      return;
    }
    this.out.readable++;
    if (sentence.type === 'other') this.out.ignored++;
    else this.assembler.push(sentence, line, this.receivedAt);
  }

  fault(code: Reject['code'], detail: string, line: number): void {
    this.out.rejects.push({ line, code, detail });
  }

  noise(): void {
    this.out.ignored++;
  }
}

export function answerOf(
  read: Pick<ReadOut, 'ignored' | 'rejects'>,
  written: { accepted: number; duplicates: number },
): IngestAnswer {
  return {
    accepted: written.accepted,
    duplicates: written.duplicates,
    ignored: read.ignored,
    rejected: read.rejects.length,
    reasons: read.rejects.slice(0, MAX_REASONS),
  };
}
