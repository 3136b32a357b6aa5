import { assert, constantFrom, integer, property, uint8Array, array } from 'fast-check';
import { describe, expect, it } from 'vitest';
import { crc24q } from './crc24q.js';
import { RtcmFrameReader } from './frame-reader.js';
import { frameOf } from './frame-writer.js';

interface Read {
  payloads: string[];
  badCrc: number;
  noise: number;
}
const hex = (bytes: Uint8Array) => [...bytes].map((byte) => byte.toString(16).padStart(2, '0')).join('');
const joined = (parts: readonly Uint8Array[]) => Uint8Array.from(parts.flatMap((part) => [...part]));

/** Reads the bytes, cut into pieces of these sizes in turn. */
function read(bytes: Uint8Array, sizes: readonly number[] = [bytes.length]): Read {
  const found: Read = { payloads: [], badCrc: 0, noise: 0 };
  const reader = new RtcmFrameReader({
    frame: (payload) => found.payloads.push(hex(payload)),
    badCrc: () => found.badCrc++,
    noise: (count) => (found.noise += count),
  });
  for (let at = 0, turn = 0; at < bytes.length; turn++) {
    const size = sizes[turn % sizes.length]!;
    // The same memory each time, as a socket may use it.
    reader.push(Uint8Array.from(bytes.subarray(at, at + size)));
    at += size;
  }
  reader.end();
  return found;
}

const payload = uint8Array({ minLength: 2, maxLength: 60 });
// Noise without the first byte of a frame: what a false one would swallow is another test's matter.
const noise = array(
  integer({ min: 0, max: 255 }).filter((byte) => byte !== 0xd3),
  { maxLength: 30 },
).map((bytes) => Uint8Array.from(bytes));
const stream = array(payload, { minLength: 1, maxLength: 6 });

describe('RTCM 3 frames', () => {
  it('are the same in one lump, in single bytes and however cut, with noise between', () => {
    assert(
      property(
        stream,
        array(noise, { minLength: 7, maxLength: 7 }),
        array(integer({ min: 1, max: 40 }), { minLength: 1, maxLength: 8 }),
        (payloads, noises, sizes) => {
          const bytes = joined([
            ...payloads.flatMap((one, index) => [noises[index]!, frameOf(one)]),
            noises[6]!,
          ]);
          const whole = read(bytes);
          expect(whole.payloads).toEqual(payloads.map(hex));
          expect(whole.badCrc).toBe(0);
          const outside = bytes.length - payloads.reduce((sum, one) => sum + one.length + 6, 0);
          expect(whole.noise).toBe(outside);
          expect(read(bytes, [1])).toEqual(whole);
          expect(read(bytes, sizes)).toEqual(whole);
        },
      ),
      { numRuns: 300 },
    );
  });
  it('are all found between any bytes at all, preambles among them', () => {
    const anything = array(constantFrom(0xd3, 0xd3, 0, 1, 3, 4, 0x13, 0xff), { maxLength: 40 }).map((bytes) =>
      Uint8Array.from(bytes),
    );
    assert(
      property(
        stream,
        array(anything, { minLength: 7, maxLength: 7 }),
        array(integer({ min: 1, max: 40 }), { minLength: 1, maxLength: 8 }),
        (payloads, noises, sizes) => {
          const bytes = joined([
            ...payloads.flatMap((one, index) => [noises[index]!, frameOf(one)]),
            noises[6]!,
          ]);
          const whole = read(bytes);
          expect(whole.payloads).toEqual(payloads.map(hex));
          expect(read(bytes, [1])).toEqual(whole);
          expect(read(bytes, sizes)).toEqual(whole);
        },
      ),
      { numRuns: 300 },
    );
  });
  it('inside of which another frame stands are that one frame', () => {
    const inner = frameOf(Uint8Array.of(0x3e, 0xd0, 1));
    expect(read(frameOf(joined([Uint8Array.of(0x43, 0x50), inner]))).payloads).toHaveLength(1);
  });
  it('with one bit wrong anywhere are not counted, and those around them are', () => {
    assert(
      property(payload, payload, payload, integer({ min: 0, max: 1_000_000 }), (first, hit, last, where) => {
        const frames = [first, hit, last].map(frameOf);
        const bit = where % (frames[1]!.length * 8);
        frames[1]![bit >> 3]! ^= 1 << (bit & 7);
        const { payloads } = read(joined(frames));
        expect(payloads[0]).toBe(hex(first));
        expect(payloads.at(-1)).toBe(hex(last));
        expect(payloads).toHaveLength(2);
      }),
      { numRuns: 500 },
    );
  });
  it('behind a preamble that was none are found, at the latest when the stream ends', () => {
    const real = frameOf(Uint8Array.of(0x3e, 0xd0, 1));
    // Says that 1023 bytes follow.
    const found = read(joined([Uint8Array.of(0xd3, 3, 0xff), real, real]));
    expect(found.payloads).toHaveLength(2);
    expect(found.noise).toBe(3);
  });
  it('whose reserved bits are set are none', () => {
    const frame = frameOf(Uint8Array.of(0x3e, 0xd0, 1));
    frame[1]! |= 4;
    expect(read(frame)).toEqual({ payloads: [], badCrc: 0, noise: frame.length });
    // Nor with a right CRC: as a length they would be 1027.
    const long = new Uint8Array(1033);
    long.set([0xd3, 4, 3, 0x3e, 0xd0]);
    const crc = crc24q(long, 0, 1030);
    long.set([crc >> 16, (crc >> 8) & 0xff, crc & 0xff], 1030);
    expect(crc24q(long)).toBe(0);
    expect(read(long)).toEqual({ payloads: [], badCrc: 0, noise: 1033 });
  });
  it.each([0, 1])('of %d bytes have no message number, and are passed over', (length) => {
    const filler = frameOf(new Uint8Array(length));
    expect(read(joined([filler, frameOf(Uint8Array.of(0x3e, 0xd0))]))).toMatchObject({
      payloads: ['3ed0'],
      noise: 0,
    });
  });
  it('hold at most 1023 bytes', () => {
    assert(
      property(constantFrom(1023), (length) => read(frameOf(new Uint8Array(length))).payloads.length === 1),
    );
    expect(() => frameOf(new Uint8Array(1024))).toThrow(RangeError);
  });
});
