import { gzipSync } from 'node:zlib';
import type { CasterFaults } from './caster-faults.js';

const CRLF = '\r\n';
const head = (lines: readonly string[]): string => `${lines.join(CRLF)}${CRLF}${CRLF}`;

/** The head of a stream. NTRIP 1 has its ICY line, and a blank line that not every caster sends. */
export function streamHead(is2: boolean, { noBlankLine, gzip, extraHeaders = [] }: CasterFaults): string {
  if (is2)
    return head([
      'HTTP/1.1 200 OK',
      'Ntrip-Version: Ntrip/2.0',
      'Content-Type: gnss/data',
      ...(gzip ? ['Content-Encoding: gzip'] : []),
      ...extraHeaders,
      'Transfer-Encoding: chunked',
      'Connection: close',
    ]);
  const icy = head(['ICY 200 OK', ...extraHeaders]);
  return noBlankLine ? icy.slice(0, -CRLF.length) : icy;
}

/** Any other answer of HTTP, both versions. */
export const httpAnswer = (
  status: string,
  headers: readonly string[],
  { extraHeaders = [] }: CasterFaults,
  body = '',
): string => {
  const length = `Content-Length: ${Buffer.byteLength(body)}`;
  return `${head([`HTTP/1.1 ${status}`, ...headers, ...extraHeaders, length, 'Connection: close'])}${body}`;
};

/** The source table with its head, whole or with the fault that it is to have. */
export function tableAnswer(text: string, is2: boolean, faults: CasterFaults): Buffer {
  const { extraHeaders = [] } = faults;
  const isCompressed = is2 && faults.gzip === true;
  const body = isCompressed ? gzipSync(text) : Buffer.from(text);
  const lines = is2
    ? ['HTTP/1.1 200 OK', 'Ntrip-Version: Ntrip/2.0', 'Content-Type: gnss/sourcetable']
    : ['SOURCETABLE 200 OK', 'Server: NTRIP simulated caster', 'Content-Type: text/plain'];
  if (isCompressed) lines.push('Content-Encoding: gzip');
  lines.push(...extraHeaders);
  const isWhole = faults.tableWithoutEnd === undefined && !faults.endlessTable;
  if (isWhole) lines.push(`Content-Length: ${body.length}`);
  if (is2) lines.push('Connection: close');
  return Buffer.concat([Buffer.from(head(lines)), body]);
}
