import type { LogDetail } from '@hubtack/contracts/logs/log.js';

const MOST_LISTED = 200;
const MOST_CHARACTERS = 120;

/** Lines that were not taken: all counted, the first ones with their text. */
export class RejectedLines {
  readonly listed: LogDetail['rejected'] = [];
  more = 0;

  get isFull(): boolean {
    return this.listed.length >= MOST_LISTED;
  }

  add(line: number, code: string, detail: string, text: () => string): void {
    if (this.isFull) this.more++;
    else this.listed.push({ line, code, detail, text: text() });
  }
}

/** What stands in bytes from `start` to the end of the line, cut, with a dot for what cannot be shown. */
export function lineText(bytes: Uint8Array, start: number): string {
  let text = '';
  for (let at = start; at < bytes.length && text.length < MOST_CHARACTERS; at++) {
    const byte = bytes[at]!;
    if (byte === 10 || byte === 13) break;
    text += byte < 32 || byte > 126 ? '\u00b7' : String.fromCharCode(byte);
  }
  return text;
}
