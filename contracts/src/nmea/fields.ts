/** Splitting and reading the fields of a sentence straight from its bytes: no strings are made on the hot path. */

const COMMA = 44;
const POINT = 46;
const MINUS = 45;
const PLUS = 43;
const MAX_FIELDS = 64;

const POWERS = Array.from({ length: 23 }, (_, exponent) => 10 ** exponent);

/** Field starts and ends of one sentence; field 0 is the address. Reused from sentence to sentence. */
export class Fields {
  bytes: Uint8Array = new Uint8Array(0);
  count = 0;
  private readonly starts = new Int32Array(MAX_FIELDS);
  private readonly ends = new Int32Array(MAX_FIELDS);

  /** Splits bytes[start, end) at commas; answers false when there are more fields than any sentence has. */
  split(bytes: Uint8Array, start: number, end: number): boolean {
    this.bytes = bytes;
    let count = 0;
    let from = start;
    for (let at = start; at <= end; at++) {
      if (at < end && bytes[at] !== COMMA) continue;
      if (count === MAX_FIELDS) return false;
      this.starts[count] = from;
      this.ends[count] = at;
      count++;
      from = at + 1;
    }
    this.count = count;
    return true;
  }

  start(field: number): number {
    return field < this.count ? this.starts[field]! : 0;
  }

  /** A field beyond the last one reads as empty: receivers leave trailing ones out. */
  length(field: number): number {
    return field < this.count ? this.ends[field]! - this.starts[field]! : 0;
  }

  isEmpty(field: number): boolean {
    return this.length(field) === 0;
  }

  /** The only character of a field, 0 when empty, -1 when there are several. */
  character(field: number): number {
    const length = this.length(field);
    if (length === 0) return 0;
    return length === 1 ? this.bytes[this.starts[field]!]! : -1;
  }

  text(field: number): string {
    let text = '';
    const end = this.start(field) + this.length(field);
    for (let at = this.start(field); at < end; at++) text += String.fromCharCode(this.bytes[at]!);
    return text;
  }

  /** A number such as 12, -3.5 or +.5; null when empty, NaN when it is not a number. */
  decimal(field: number): number | null {
    const length = this.length(field);
    if (length === 0) return null;
    return decimalOf(this.bytes, this.starts[field]!, this.starts[field]! + length);
  }

  /** Digits only; null when empty, NaN otherwise. */
  whole(field: number): number | null {
    const length = this.length(field);
    if (length === 0) return null;
    return wholeOf(this.bytes, this.starts[field]!, this.starts[field]! + length);
  }
}

/** Value of the digits bytes[start, end); NaN when there are none, another character, or more than 15 of them. */
export function wholeOf(bytes: Uint8Array, start: number, end: number): number {
  if (end <= start || end - start > 15) return NaN;
  let value = 0;
  for (let at = start; at < end; at++) {
    const digit = bytes[at]! - 48;
    if (digit < 0 || digit > 9) return NaN;
    value = value * 10 + digit;
  }
  return value;
}

/** Value of bytes[start, end) as an optional sign, digits and an optional point; rounded once, as a correct reader does. */
export function decimalOf(bytes: Uint8Array, start: number, end: number): number {
  let at = start;
  const sign = bytes[at];
  if (sign === MINUS || sign === PLUS) at++;
  let digits = 0;
  let value = 0;
  let decimals = -1;
  for (; at < end; at++) {
    const byte = bytes[at]!;
    if (byte === POINT && decimals < 0) {
      decimals = 0;
      continue;
    }
    const digit = byte - 48;
    if (digit < 0 || digit > 9) return NaN;
    // Leading zeros carry nothing; past 15 digits an integer no longer fits a double exactly.
    if (digits > 0 || digit > 0) digits++;
    if (digits > 15) return NaN;
    value = value * 10 + digit;
    if (decimals >= 0) decimals++;
  }
  if (decimals === 0 && end - start < 2) return NaN;
  if (end === start || (decimals < 0 && end - start === 1 && (sign === MINUS || sign === PLUS))) return NaN;
  if (decimals > 22) return NaN;
  const magnitude = decimals > 0 ? value / POWERS[decimals]! : value;
  return sign === MINUS ? -magnitude : magnitude;
}
