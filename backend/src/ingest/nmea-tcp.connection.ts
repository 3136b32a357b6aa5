import type { Socket } from 'node:net';
import { setTimeout as delay } from 'node:timers/promises';
import type { Clock } from '../common/clock.js';
import type { IngestService } from './ingest.service.js';
import type { RoverKeyService } from './rover-key.service.js';
import { SentenceBatch, type ReadOut } from './sentence.batch.js';

/** A connection that does not say its key in this time is closed. */
const KEY_WITHIN_MS = 10_000;
/** A keyed connection that has been still for this long is taken for dead. */
const IDLE_MS = 3_600_000;
/** Longest first line: `KEY `, the key, and line end. */
const MAX_KEY_LINE = 256;
const RETRY_MS = 1000;
const LF = 10;

/**
 * One rover's plain stream. There is nothing to answer with, so when the store refuses, the connection stops reading and
 * tries again: the sender is held back by its own full buffer and nothing that was read is lost.
 */
export class NmeaTcpConnection {
  private key: string | null = null;
  private roverId = 0;
  private opening: Buffer = Buffer.alloc(0);
  private readonly batch = new SentenceBatch();
  private readonly keyTimer: NodeJS.Timeout;
  private settleTimer: NodeJS.Timeout | null = null;
  private storing: Promise<void> | null = null;
  private stopped = false;

  constructor(
    private readonly socket: Socket,
    private readonly ingest: IngestService,
    private readonly keys: RoverKeyService,
    private readonly clock: Clock,
  ) {
    this.keyTimer = setTimeout(() => this.refuse('no key'), KEY_WITHIN_MS);
    socket.on('data', (chunk) => this.read(chunk));
    socket.on('end', () => this.finish());
    socket.on('timeout', () => socket.destroy());
    socket.on('error', () => socket.destroy());
    socket.on('close', () => {
      clearTimeout(this.keyTimer);
      if (this.key !== null) this.finish();
    });
  }

  /** Ends the connection when its key no longer counts. */
  checkKey(): void {
    if (this.key === null || typeof this.keys.find(this.key) === 'object') return;
    this.refuse('key taken back');
  }

  /** Takes no more, and waits for what was read to be stored or refused once. */
  async stop(): Promise<void> {
    this.stopped = true;
    this.socket.pause();
    if (this.key !== null) this.finish();
    await this.storing;
    this.socket.destroy();
  }

  private refuse(reason: string): void {
    this.socket.end(`ERROR ${reason}\r\n`, () => this.socket.destroy());
    this.socket.pause();
  }

  private read(chunk: Buffer): void {
    if (this.key !== null) return this.readSentences(chunk);
    this.opening = this.opening.length === 0 ? chunk : Buffer.concat([this.opening, chunk]);
    const end = this.opening.indexOf(LF);
    if (end < 0) {
      if (this.opening.length > MAX_KEY_LINE) this.refuse('no key');
      return;
    }
    const [word, key] = this.opening
      .subarray(0, Math.min(end, MAX_KEY_LINE))
      .toString('latin1')
      .trim()
      .split(/\s+/);
    const known = word === 'KEY' && key ? this.keys.find(key) : 'unknown';
    if (typeof known === 'string') return this.refuse(known === 'revoked' ? 'key taken back' : 'unknown key');
    clearTimeout(this.keyTimer);
    this.socket.setTimeout(IDLE_MS);
    this.key = key!;
    this.roverId = known.roverId;
    const rest = this.opening.subarray(end + 1);
    this.opening = Buffer.alloc(0);
    if (rest.length > 0) this.readSentences(rest);
  }

  private readSentences(chunk: Buffer): void {
    const now = this.clock.now();
    this.batch.push(chunk, now);
    this.settle(now);
  }

  private settle(now: number): void {
    const waits = this.batch.settle(now);
    if (waits && this.settleTimer === null) {
      this.settleTimer = setTimeout(() => {
        this.settleTimer = null;
        this.settle(this.clock.now());
      }, 1001);
    }
    this.storeTaken();
  }

  private finish(): void {
    if (this.settleTimer) clearTimeout(this.settleTimer);
    this.settleTimer = null;
    this.batch.finish();
    this.storeTaken();
  }

  private storeTaken(): void {
    const read = this.batch.take(this.ingest.limits());
    if (read.epochs.length + read.sigmas.length + read.rejects.length === 0) return;
    const before = this.storing;
    const storing = this.store(read, before).finally(() => {
      if (this.storing === storing) this.storing = null;
    });
    this.storing = storing;
  }

  /** One write at a time and connection; the socket rests while one is on its way only if the store pushes back. */
  private async store(read: ReadOut, before: Promise<void> | null): Promise<void> {
    if (before) {
      this.socket.pause();
      await before;
    }
    for (let tries = 0; ; tries++) {
      try {
        // Rejects are counted once, whatever the number of tries.
        await this.ingest.store(this.roverId, tries === 0 ? read : { ...read, rejects: [] });
        break;
      } catch {
        if (this.stopped) break;
        this.socket.pause();
        await delay(RETRY_MS);
      }
    }
    if (!this.stopped && !this.socket.destroyed) this.socket.resume();
  }
}
