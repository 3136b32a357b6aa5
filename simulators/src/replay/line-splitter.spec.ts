import { writeGga } from '@hubtack/contracts/nmea/sentence-writer.js';
import { readText } from '@hubtack/contracts/testing/read-text.js';
import fc from 'fast-check';
import { expect, it } from 'vitest';
import { LineSplitter } from './line-splitter.js';
import { sentencesIn } from './line-time.js';

const absent = { hdop: null, altitudeM: null, geoidSeparationM: null, ageSeconds: null, stationId: null };
const gga = (second: number) =>
  writeGga({ time: second * 1000, latitude: 1, longitude: 2, quality: 4, satellites: 12, ...absent });
const linesOf = (bytes: Uint8Array, size: number) => {
  const splitter = new LineSplitter();
  const lines: Uint8Array[] = [];
  for (let at = 0; at < bytes.length; at += size) lines.push(...splitter.push(bytes.subarray(at, at + size)));
  return [...lines, ...splitter.end()];
};

it('ends a line after LF, in whatever pieces the bytes come', () => {
  const text = `${gga(0)}# note\n${gga(1)}half`;
  for (const size of [1, 10, 1000]) {
    const lines = linesOf(Buffer.from(text), size).map((line) => Buffer.from(line).toString());
    expect(lines).toEqual([gga(0), '# note\n', gga(1), 'half']);
  }
});

it('never cuts through a sentence, also where no line ends for long (CR alone, other protocols)', () => {
  const second = fc.integer({ min: 0, max: 86_399 });
  const stretch = fc.oneof(
    second.map((at) => Buffer.from(gga(at).replace('\n', ''))),
    fc.uint8Array({ maxLength: 200 }).map((bytes) => Buffer.from(bytes)),
    fc.integer({ min: 500, max: 5000 }).map((length) => Buffer.alloc(length, 0xb5)),
  );
  fc.assert(
    fc.property(
      fc.array(stretch, { minLength: 20, maxLength: 120 }),
      fc.integer({ min: 1, max: 5000 }),
      (stretches, size) => {
        const bytes = Buffer.concat(stretches);
        const lines = linesOf(bytes, size);
        expect(Buffer.concat(lines).equals(bytes)).toBe(true);
        expect(Math.max(0, ...lines.map(({ length }) => length))).toBeLessThanOrEqual(4097);
        expect(lines.flatMap((line) => sentencesIn(line))).toEqual(readText(bytes).sentences);
      },
    ),
    { numRuns: 100 },
  );
});
