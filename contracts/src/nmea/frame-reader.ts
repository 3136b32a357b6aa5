/** Why bytes that began like a sentence are not one. */
export type FrameFault = 'badChecksum' | 'noChecksum' | 'malformed' | 'tooLong' | 'cutShort';

export interface FrameSink {
  /** A sentence whose checksum is right: its characters are bytes[start, end), without `$`, `*` and what follows. */
  sentence(bytes: Uint8Array, start: number, end: number, line: number): void;
  /** Its `$` is bytes[dollar]; the bytes are good for as long as the call lasts. */
  fault(code: FrameFault, detail: string, line: number, bytes: Uint8Array, dollar: number): void;
  /** Bytes that are no sentence at all (comments, other protocols, line noise); once a line. */
  noise(line: number): void;
}

/**
 * NMEA 0183 allows 82 characters; RTK receivers send 90 to 93 (more decimals) and some more.
 * Far above that a line is not a sentence.
 */
export const MAX_SENTENCE_BYTES = 256;

const LF = 10;
const CR = 13;
const DOLLAR = 36;
const STAR = 42;
const COMMA = 44;
const NO_BYTES = new Uint8Array(0);

/** Value of a hexadecimal digit in either case, or -1. */
const hexValue = (byte: number | undefined): number => {
  if (byte === undefined) return -1;
  if (byte >= 48 && byte <= 57) return byte - 48;
  const letter = byte & 0xdf;
  return letter >= 65 && letter <= 70 ? letter - 55 : -1;
};

const hexByte = (value: number): string => value.toString(16).toUpperCase().padStart(2, '0');

/** Five capitals or digits and a comma, or `P` and more for proprietary ones: without it a `$` was a stray byte. */
function hasAddress(bytes: Uint8Array, start: number, end: number): boolean {
  for (let i = start; i < end; i++) {
    const byte = bytes[i]!;
    if (byte === COMMA) return i - start >= 4 && i - start <= 8;
    const isCapitalOrDigit = (byte >= 65 && byte <= 90) || (byte >= 48 && byte <= 57);
    if (!isCapitalOrDigit) return false;
  }
  return false;
}

/**
 * Finds sentences in bytes as they arrive, in one pass, however they are cut into chunks.
 * Steps over what is not a sentence and takes up again at the next `$`, so that noise never costs a good sentence.
 * Framing and checksum after NMEA 0183 ("NMEA Revealed", section on encoding): `$`, characters, `*`, and the XOR of
 * the characters between them as two hexadecimal digits (lower case is seen in the field, one digit is not enough).
 */
export class FrameReader {
  private carry = NO_BYTES;
  private line = 1;
  private noisy = false;
  private lastWasReturn = false;
  /** After an overlong line: everything up to the next line end or `$` belongs to it. */
  private skipping = false;

  /** Reads on; sentences that are complete are handed to the sink at once. */
  push(chunk: Uint8Array, sink: FrameSink): void {
    let bytes = chunk;
    if (this.carry.length > 0) {
      bytes = new Uint8Array(this.carry.length + chunk.length);
      bytes.set(this.carry);
      bytes.set(chunk, this.carry.length);
      this.carry = NO_BYTES;
    }
    this.read(bytes, sink);
  }

  /** No more bytes will come: what is left over is a sentence cut short. */
  end(sink: FrameSink): void {
    const left = this.carry;
    this.carry = NO_BYTES;
    if (left.length > 0) {
      if (hasAddress(left, 1, left.length))
        sink.fault('cutShort', 'the sentence ends in the middle', this.line, left, 0);
      else this.markNoise(sink);
    }
    this.noisy = false;
    this.skipping = false;
  }

  private read(bytes: Uint8Array, sink: FrameSink): void {
    const length = bytes.length;
    let at = 0;
    while (at < length) {
      const byte = bytes[at]!;
      if (byte !== DOLLAR) {
        this.between(byte, sink);
        at++;
        continue;
      }
      this.lastWasReturn = false;
      this.skipping = false;
      at = this.readSentence(bytes, at, sink);
      if (at < 0) return;
    }
  }

  /** A byte outside any sentence. */
  private between(byte: number, sink: FrameSink): void {
    if (byte === LF) {
      if (!this.lastWasReturn) this.nextLine();
      this.lastWasReturn = false;
    } else if (byte === CR) {
      this.nextLine();
      this.lastWasReturn = true;
    } else {
      this.lastWasReturn = false;
      if (byte !== 32 && byte !== 9 && !this.skipping) this.markNoise(sink);
    }
  }

  private nextLine(): void {
    this.line++;
    this.noisy = false;
    this.skipping = false;
  }

  private markNoise(sink: FrameSink): void {
    if (this.noisy) return;
    this.noisy = true;
    sink.noise(this.line);
  }

  /** Reads from the `$` at `dollar`; answers where to go on, or -1 when the rest was carried to the next chunk. */
  private readSentence(bytes: Uint8Array, dollar: number, sink: FrameSink): number {
    const length = bytes.length;
    const limit = dollar + MAX_SENTENCE_BYTES;
    let sum = 0;
    let at = dollar + 1;
    for (; at < length; at++) {
      const byte = bytes[at]!;
      if (byte === STAR) return this.readChecksum(bytes, dollar, at, sum, sink);
      if (byte < 32 || byte > 126 || byte === DOLLAR || at >= limit) {
        this.brokenOff(bytes, dollar, at, byte, sink);
        return at;
      }
      sum ^= byte;
    }
    this.keep(bytes, dollar);
    return -1;
  }

  /** A copy, which `slice` of Node's own Buffer is not: whoever reads a file fills the same bytes again. */
  private keep(bytes: Uint8Array, dollar: number): void {
    this.carry = new Uint8Array(bytes.subarray(dollar));
  }

  private readChecksum(
    bytes: Uint8Array,
    dollar: number,
    star: number,
    sum: number,
    sink: FrameSink,
  ): number {
    const high = hexValue(bytes[star + 1]);
    const low = hexValue(bytes[star + 2]);
    if (high >= 0 && low >= 0) {
      const given = high * 16 + low;
      if (given === sum) sink.sentence(bytes, dollar + 1, star, this.line);
      else if (hasAddress(bytes, dollar + 1, star))
        sink.fault(
          'badChecksum',
          `the characters give ${hexByte(sum)}, the sentence says ${hexByte(given)}`,
          this.line,
          bytes,
          dollar,
        );
      else this.markNoise(sink);
      return star + 3;
    }
    const needed = high >= 0 ? star + 2 : star + 1;
    if (needed >= bytes.length) {
      this.keep(bytes, dollar);
      return -1;
    }
    if (hasAddress(bytes, dollar + 1, star))
      sink.fault('malformed', 'the checksum is not two hexadecimal digits', this.line, bytes, dollar);
    else this.markNoise(sink);
    // What stands after the star may be the next sentence: go on at the first character that is no digit.
    return needed;
  }

  private brokenOff(bytes: Uint8Array, dollar: number, at: number, byte: number, sink: FrameSink): void {
    if (!hasAddress(bytes, dollar + 1, at)) this.markNoise(sink);
    else if (byte === CR || byte === LF)
      sink.fault('noChecksum', 'the sentence has no checksum', this.line, bytes, dollar);
    else if (byte === DOLLAR)
      sink.fault('cutShort', 'another sentence begins before this one ends', this.line, bytes, dollar);
    else if (byte < 32 || byte > 126)
      sink.fault('malformed', 'a character that no sentence may hold', this.line, bytes, dollar);
    else sink.fault('tooLong', `longer than ${MAX_SENTENCE_BYTES} characters`, this.line, bytes, dollar);
    // The rest of a broken line belongs to the fault that was just told.
    if (byte !== DOLLAR && byte !== CR && byte !== LF) this.skipping = true;
  }
}
