import { ChunkedDecoder } from './chunked-decoder.js';

/** How a caster, or whatever answers at its address, has begun its answer. */
export interface ReplyHead {
  /** `icy`: NTRIP 1 stream; `table`: NTRIP 1 source table; `error`: NTRIP 1 refusal; `http`: any HTTP answer; `other`: no caster. */
  kind: 'icy' | 'table' | 'error' | 'http' | 'other';
  /** HTTP status; null for the others. */
  status: number | null;
  /** The first line, printable and short. */
  firstLine: string;
  /** Lower-case names. */
  headers: ReadonlyMap<string, string>;
}

export interface ReplyHandlers {
  head: (head: ReplyHead) => void;
  /** Bytes of the body, chunk sizes taken off. */
  body: (bytes: Uint8Array) => void;
  /** The answer says that it is complete. */
  done: () => void;
}

/** No head of a real caster is longer: what is, is something else. */
export const MAX_HEAD_BYTES = 16 * 1024;
const LF = 10;
const HEADER = /^([A-Za-z][A-Za-z0-9-]*): *(.*)$/;
/** The beginning of a header line that has not ended yet; text, and not the binary of a stream. */
const HEADER_BEGUN = /^[A-Za-z][A-Za-z0-9-]*(:[ -~]*\r?)?$/;
const RECORD = /^(STR|CAS|NET);|^ENDSOURCETABLE/;

/** What was received, as it may be shown to a person. */
export const shown = (text: string): string => text.replaceAll(/[^\u0020-\u007e]/g, '·').slice(0, 80);

/**
 * Reads the answer to one NTRIP request, however it is cut: version 1 (`ICY 200 OK`, with a blank line after it or without; `SOURCETABLE
 * 200 OK`; `ERROR - …`) and version 2, which is HTTP (RTCM 10410.0 and 10410.1).
 */
export class ReplyReader {
  private held = Buffer.alloc(0);
  private first: string | null = null;
  private kind: ReplyHead['kind'] = 'other';
  private readonly headers = new Map<string, string>();
  private isInBody = false;
  private isOver = false;
  private chunked: ChunkedDecoder | null = null;
  private bytesLeft: number | null = null;

  constructor(private readonly handlers: ReplyHandlers) {}

  push(chunk: Uint8Array): void {
    if (this.isOver) return;
    if (this.isInBody) return this.give(chunk);
    this.held = Buffer.concat([this.held, chunk]);
    while (!this.isInBody) {
      const length = this.held.indexOf(LF);
      if (this.first !== null && this.kind === 'icy' && this.bodyBegins(length)) return this.beginBody();
      if (length < 0) {
        if (this.held.length > MAX_HEAD_BYTES) this.giveUp();
        return;
      }
      const line = this.held.toString('latin1', 0, length).replace(/\r$/, '');
      if (this.first !== null && this.kind === 'table' && RECORD.test(line)) return this.beginBody();
      this.held = this.held.subarray(length + 1);
      this.readLine(line);
    }
  }

  /** The connection has ended. */
  end(): void {
    if (this.isOver || this.isInBody) return;
    if (this.first === null && this.held.length > 0) this.giveUp();
    else if (this.first !== null) this.beginBody();
  }

  private readLine(line: string): void {
    if (this.first === null) {
      this.first = line;
      this.kind = kindOf(line);
      if (this.kind === 'error' || this.kind === 'other') this.beginBody();
    } else if (line === '') this.beginBody();
    else {
      const [, name, value] = HEADER.exec(line) ?? [];
      if (name !== undefined) this.headers.set(name.toLowerCase(), value ?? '');
    }
  }

  /** After ICY come a blank line, header lines, or the stream at once. */
  private bodyBegins(lineLength: number): boolean {
    const first = this.held[0];
    if (first === undefined || first === 13 || first === LF) return false;
    if (lineLength >= 0) return !HEADER.test(this.held.toString('latin1', 0, lineLength).replace(/\r$/, ''));
    return !HEADER_BEGUN.test(this.held.toString('latin1', 0, 64));
  }

  private beginBody(): void {
    this.isInBody = true;
    const rest = this.held;
    this.held = Buffer.alloc(0);
    this.tell();
    if (this.kind === 'http' && /chunked/i.test(this.headers.get('transfer-encoding') ?? ''))
      this.chunked = new ChunkedDecoder(this.handlers.body, () => this.finish());
    else if (this.kind === 'http' && this.headers.has('content-length'))
      this.bytesLeft = Number(this.headers.get('content-length'));
    if (this.bytesLeft === 0) this.finish();
    else if (rest.length > 0) this.give(rest);
  }

  private tell(): void {
    const first = this.first ?? '';
    const status = /^HTTP\/1\.\d (\d{3})/.exec(first)?.[1];
    this.handlers.head({
      kind: this.kind,
      status: status === undefined ? null : Number(status),
      firstLine: shown(first),
      headers: this.headers,
    });
  }

  /** A first line that does not end: a banner, or binary. */
  private giveUp(): void {
    this.kind = 'other';
    this.first ??= this.held.toString('latin1', 0, 200);
    this.isOver = true;
    this.tell();
  }

  private give(bytes: Uint8Array): void {
    if (this.chunked) return this.chunked.push(bytes);
    if (this.bytesLeft === null) return this.handlers.body(bytes);
    const part = bytes.subarray(0, this.bytesLeft);
    this.bytesLeft -= part.length;
    if (part.length > 0) this.handlers.body(part);
    if (this.bytesLeft === 0) this.finish();
  }

  private finish(): void {
    this.isOver = true;
    this.handlers.done();
  }
}

function kindOf(line: string): ReplyHead['kind'] {
  if (/^ICY 200/i.test(line)) return 'icy';
  if (/^SOURCETABLE 200/i.test(line)) return 'table';
  if (/^ERROR/i.test(line)) return 'error';
  return /^HTTP\/1\.\d \d{3}/.test(line) ? 'http' : 'other';
}
