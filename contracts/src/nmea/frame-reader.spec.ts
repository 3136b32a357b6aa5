import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { publishedGga, publishedOthers } from '../testing/published-sentences.js';
import { readText } from '../testing/read-text.js';
import { MAX_SENTENCE_BYTES } from './frame-reader.js';

const good = publishedGga[7].text;
const codes = (input: string | Uint8Array) => readText(input).faults.map(({ code, line }) => [code, line]);

describe('framing', () => {
  it('takes sentences ended by CR LF, LF, CR, or by nothing at the end', () => {
    for (const end of ['\r\n', '\n', '\r'])
      expect(readText(`${good}${end}${good}`).sentences).toHaveLength(2);
  });
  it('takes sentences far longer than 82 bytes, and refuses those beyond any sense', () => {
    expect(good.length).toBeGreaterThan(82);
    expect(codes(`$GPGGA,${'1'.repeat(MAX_SENTENCE_BYTES)}\r\n${good}\r\n`)).toEqual([['tooLong', 1]]);
  });
  it('a line of a million characters costs no good sentence', () => {
    const { sentences, faults } = readText(
      `${good}\r\n$GPGGA,${'9'.repeat(1_000_000)}\r\n${good}\r\n`,
      65_536,
    );
    expect(sentences).toHaveLength(2);
    expect(faults.map(({ code }) => code)).toEqual(['tooLong']);
  });
  it('takes lower-case checksums, refuses one of a single digit and a missing one', () => {
    expect(readText(`${good.slice(0, -2)}${good.slice(-2).toLowerCase()}\r\n`).sentences).toHaveLength(1);
    expect(codes(`${good.slice(0, -2)}D\r\n${good}\r\n`)).toEqual([['malformed', 1]]);
    expect(codes(`${good.slice(0, -3)}\r\n${good}\r\n`)).toEqual([['noChecksum', 1]]);
  });
  it('one flipped character anywhere between $ and * is noticed', () => {
    for (let at = 1; at < good.length - 3; at++) {
      const flipped = String.fromCharCode(good.charCodeAt(at) ^ 1);
      const { sentences } = readText(`${good.slice(0, at)}${flipped}${good.slice(at + 1)}\r\n`);
      expect(sentences.filter(({ type }) => type === 'gga')).toEqual([]);
    }
  });
  it('two sentences run together: the first is cut short, the second counts', () => {
    const { sentences, faults } = readText(`${good.slice(0, 30)}${good}\r\n`);
    expect(sentences).toHaveLength(1);
    expect(faults).toMatchObject([{ code: 'cutShort', line: 1 }]);
  });
  it('half a sentence at the end is cut short', () => {
    expect(codes(`${good}\r\n${good.slice(0, 40)}`)).toEqual([['cutShort', 2]]);
  });
  it('comments and other protocols are stepped over and counted once a line', () => {
    const bytes = new Uint8Array([0xb5, 0x62, 0x01, 0x24, 0x07, 0x00, 0xff, 0xd3, 0x00, 0x13]);
    const text = new TextEncoder().encode(`${good}\r\n`);
    const { sentences, noise, faults } = readText(new Uint8Array([...bytes, ...text, ...bytes, ...text]));
    expect({ count: sentences.length, noise, faults }).toEqual({ count: 2, noise: [1, 2], faults: [] });
    expect(readText('# a comment\n# another\n').noise).toEqual([1, 2]);
  });
  it('a character that no sentence may hold breaks that sentence only', () => {
    const broken = good.replace('GNGGA,1', 'GNGGA,\u0001');
    expect(codes(`${broken}\r\n${good}\r\n`)).toEqual([['malformed', 1]]);
  });
  it('names the line', () => {
    expect(codes(`${good}\r\n\r\n${good.slice(0, -2)}00\r\n`)).toEqual([['badChecksum', 3]]);
  });
});

describe('chunks', () => {
  const sentences = [...publishedGga, ...publishedOthers].map(({ text }) => text);
  const piece = fc.oneof(
    { weight: 4, arbitrary: fc.constantFrom(...sentences).map((text) => `${text}\r\n`) },
    fc.constantFrom(...sentences).chain((text) => fc.nat(text.length).map((length) => text.slice(0, length))),
    fc.uint8Array({ maxLength: 40 }).map((bytes) => String.fromCharCode(...bytes)),
  );
  const bytesOf = (pieces: string[]) =>
    Uint8Array.from(pieces.join(''), (character) => character.charCodeAt(0));

  it('reads the same however the bytes are cut', () => {
    fc.assert(
      fc.property(fc.array(piece, { maxLength: 12 }), fc.integer({ min: 1, max: 50 }), (pieces, size) => {
        const bytes = bytesOf(pieces);
        expect(readText(bytes, size)).toEqual(readText(bytes));
      }),
      { numRuns: 500 },
    );
  });
  it('noise before a sentence never costs it', () => {
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 600 }), fc.constantFrom(...sentences), (noise, text) => {
        const bytes = new Uint8Array([...noise, ...new TextEncoder().encode(`\r\n${text}\r\n`)]);
        expect(readText(bytes).sentences.at(-1)).toEqual(readText(text).sentences[0]);
      }),
      { numRuns: 500 },
    );
  });
});
