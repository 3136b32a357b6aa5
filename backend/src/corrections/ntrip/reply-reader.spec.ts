import { array, assert, constantFrom, integer, property, uint8Array } from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ReplyReader, type ReplyHead } from './reply-reader.js';

interface Read {
  head: ReplyHead | null;
  body: string;
  isDone: boolean;
}

function read(bytes: Uint8Array, sizes: readonly number[] = [bytes.length || 1]): Read {
  const found: Read = { head: null, body: '', isDone: false };
  const reader = new ReplyReader({
    head: (head) => (found.head = head),
    body: (part) => (found.body += Buffer.from(part).toString('latin1')),
    done: () => (found.isDone = true),
  });
  for (let at = 0, turn = 0; at < bytes.length; turn++) {
    const size = sizes[turn % sizes.length]!;
    reader.push(bytes.subarray(at, at + size));
    at += size;
  }
  reader.end();
  return found;
}
const text = (lines: string): Buffer => Buffer.from(lines.replaceAll('\n', '\r\n'), 'latin1');

describe('the answer of a caster', () => {
  it.each<[string, string, Partial<ReplyHead>, string]>([
    ['ICY with a blank line', 'ICY 200 OK\n\n\u00d3abc', { kind: 'icy' }, '\u00d3abc'],
    ['ICY without one', 'ICY 200 OK\n\u00d3abc', { kind: 'icy' }, '\u00d3abc'],
    ['ICY with headers', 'ICY 200 OK\nServer: x\n\n\u00d3abc', { kind: 'icy' }, '\u00d3abc'],
    [
      'a refusal of version 1',
      'ERROR - Bad Password\n',
      { kind: 'error', firstLine: 'ERROR - Bad Password' },
      '',
    ],
    ['a refusal of version 2', 'HTTP/1.1 401 Unauthorized\nX: y\n\n', { kind: 'http', status: 401 }, ''],
    ['a table of version 1', 'SOURCETABLE 200 OK\nServer: x\n\nSTR;A\n', { kind: 'table' }, 'STR;A\r\n'],
    ['a table without a blank line', 'SOURCETABLE 200 OK\nSTR;A\n', { kind: 'table' }, 'STR;A\r\n'],
    ['a mail server', '220 mail.example ESMTP\n', { kind: 'other', firstLine: '220 mail.example ESMTP' }, ''],
  ])('%s', (_what, answer, head, body) => {
    const found = read(text(answer));
    expect(found.head).toMatchObject(head);
    expect(found.body).toBe(body);
    expect(read(text(answer), [1])).toEqual(found);
  });
  it('a banner without a line end is given up, and not kept', () => {
    const found = read(Buffer.alloc(10_000_000, 'B'), [65_536]);
    expect(found.head).toMatchObject({ kind: 'other', firstLine: 'B'.repeat(80) });
    expect(found.body).toBe('');
  });
  it('binary in place of an answer is shown as dots', () => {
    expect(read(Uint8Array.of(0x16, 3, 1, 10)).head).toMatchObject({ kind: 'other', firstLine: '···' });
  });
  it('chunks are put together, sizes in any case, extensions and trailers passed over', () => {
    const answer = text(
      'HTTP/1.1 200 OK\nTransfer-Encoding: chunked\n\n4;x=y\nabcd\nB\nefghijklmno\n0\nTrailer: x\n\nnoise',
    );
    expect(read(answer)).toMatchObject({ body: 'abcdefghijklmno', isDone: true });
  });
  it('a chunk size that is none ends the answer', () => {
    expect(read(text('HTTP/1.1 200 OK\nTransfer-Encoding: chunked\n\nzz\nabcd\n'))).toMatchObject({
      body: '',
      isDone: true,
    });
  });
  it('Content-Length ends it', () => {
    expect(read(text('HTTP/1.1 200 OK\nContent-Length: 3\n\nabcdef'))).toMatchObject({
      body: 'abc',
      isDone: true,
    });
  });
  it('is the same however it is cut', () => {
    const data = uint8Array({ minLength: 1, maxLength: 60 });
    assert(
      property(
        array(data, { minLength: 1, maxLength: 6 }),
        array(integer({ min: 1, max: 30 }), { minLength: 1, maxLength: 6 }),
        constantFrom(true, false),
        (chunks, sizes, isChunked) => {
          const whole = Buffer.concat(chunks).toString('latin1');
          const bytes = Buffer.concat([
            text(`HTTP/1.1 200 OK\n${isChunked ? 'Transfer-Encoding: chunked\n' : ''}\n`),
            ...chunks.flatMap((chunk) =>
              isChunked ? [text(`${chunk.length.toString(16)}\n`), chunk, text('\n')] : [chunk],
            ),
          ]);
          expect(read(bytes, sizes).body).toBe(whole);
        },
      ),
      { numRuns: 300 },
    );
  });
});
