import { readFileSync } from 'node:fs';
import { geodeticOf } from '@hubtack/contracts/geodesy/ecef.js';
import { crc24q } from '@hubtack/contracts/rtcm/crc24q.js';
import { RtcmFrameReader } from '@hubtack/contracts/rtcm/frame-reader.js';
import { frameOf } from '@hubtack/contracts/rtcm/frame-writer.js';
import { readStation, writeStation, type Station } from '@hubtack/contracts/rtcm/station.js';
import { describe, expect, it } from 'vitest';
import { fromRoot } from '../harness/root.js';

/** RTCM 10403.x, the worked example of message 1005 (section 4.2), as reproduced in several open test suites. */
const example = Buffer.from('D300133ED7D30202980EDEEF34B4BD62AC0941986F33360B98', 'hex');

function numbersOf(bytes: Uint8Array): number[] {
  const numbers: number[] = [];
  const reader = new RtcmFrameReader({ frame: (_payload, number) => numbers.push(number) });
  reader.push(bytes);
  reader.end();
  return numbers;
}

describe('CRC-24Q', () => {
  it('of 123456789 is 0xCDE703 (catalogue of parametrised CRC algorithms, CRC-24/LTE-A)', () => {
    expect(crc24q(Buffer.from('123456789'))).toBe(0xcde703);
  });
  it('is not CRC-24/OPENPGP, the same polynomial from another start, which gives 0x21CF02', () => {
    const withStart = (start: number, text: string) => {
      let crc = start;
      for (const byte of Buffer.from(text)) {
        crc ^= byte << 16;
        for (let bit = 0; bit < 8; bit++)
          crc = crc & 0x800000 ? ((crc << 1) ^ 0x1864cfb) & 0xffffff : crc << 1;
      }
      return crc;
    };
    expect(withStart(0xb704ce, '123456789')).toBe(0x21cf02);
    expect(crc24q(Buffer.from('123456789'))).not.toBe(0x21cf02);
    // Bit by bit, so that the table has a second computation beside it.
    for (const text of ['', 'a', '\u0000\u00ff', 'a longer text, of more bytes than a word has'])
      expect(crc24q(Buffer.from(text))).toBe(withStart(0, text));
  });
  it('over a whole frame with its CRC is 0', () => {
    expect(crc24q(example)).toBe(0);
    expect(crc24q(example, 0, example.length - 3)).toBe(0x360b98);
  });
});

describe('the published 1005 frame', () => {
  it('is station 2003 at 1114104.5999, -4850729.7108, 3975521.4643 m', () => {
    const found: (Station | null)[] = [];
    const reader = new RtcmFrameReader({ frame: (payload) => found.push(readStation(payload)) });
    reader.push(example);
    expect(found).toEqual([
      {
        stationId: 2003,
        isVirtual: false,
        x: 1114104.5999,
        y: -4850729.7108,
        z: 3975521.4643,
        antennaHeightM: null,
      },
    ]);
    const place = geodeticOf(found[0]!);
    // Computed with GeographicLib 2.1.2 (CartConvert).
    expect(place.latitude).toBeCloseTo(38.80475943, 8);
    expect(place.longitude).toBeCloseTo(-77.0647736, 8);
    expect(place.heightM).toBeCloseTo(114.561, 3);
  });
  it('is what the writer makes of that station, but for the constellations that it says', () => {
    const station = readStation(example.subarray(3, 22))!;
    const written = frameOf(writeStation(station));
    expect(written).toHaveLength(example.length);
    expect(readStation(written.subarray(3, 22))).toEqual(station);
  });
  it('with any one bit changed is no frame', () => {
    for (let bit = 0; bit < example.length * 8; bit++) {
      const wrong = Uint8Array.from(example);
      wrong[bit >> 3]! ^= 1 << (bit & 7);
      expect(numbersOf(wrong)).toEqual([]);
    }
  });
  it('with any one byte changed to any other is no frame', () => {
    for (let at = 0; at < example.length; at++)
      for (let change = 1; change < 256; change++) {
        const wrong = Uint8Array.from(example);
        wrong[at]! ^= change;
        expect(numbersOf(wrong)).toEqual([]);
      }
  });
  it('cut anywhere is no frame', () => {
    for (let length = 0; length < example.length; length++) {
      expect(numbersOf(example.subarray(0, length))).toEqual([]);
      expect(numbersOf(example.subarray(example.length - length))).toEqual([]);
    }
  });
});

describe('a recorded base station (simulators/recordings/aamakinen.rtcm3)', () => {
  const bytes = readFileSync(fromRoot('simulators/recordings/aamakinen.rtcm3'));
  it('is 127 frames and nothing else', () => {
    const counts = new Map<number, number>();
    let outside = 0;
    let wrong = 0;
    const reader = new RtcmFrameReader({
      frame: (_payload, number) => counts.set(number, (counts.get(number) ?? 0) + 1),
      badCrc: () => wrong++,
      noise: (count) => (outside += count),
    });
    reader.push(bytes);
    reader.end();
    expect(Object.fromEntries(counts)).toEqual({
      1005: 21,
      1077: 22,
      1084: 21,
      1097: 21,
      1127: 21,
      1230: 21,
    });
    expect([wrong, outside]).toEqual([0, 0]);
  });
  it('with any one bit wrong has one frame less, and all the others', () => {
    const frames = numbersOf(bytes).length;
    // One bit in each stretch of so many: a prime, so that every place in a byte and in the frames comes up.
    for (let bit = 0; bit < bytes.length * 8; bit += 1009) {
      const wrong = Uint8Array.from(bytes);
      wrong[bit >> 3]! ^= 1 << (bit & 7);
      expect(numbersOf(wrong)).toHaveLength(frames - 1);
    }
  });
  it('stands at 63.35665315 N, 23.35591775 E, 93.761 m', () => {
    const stations: Station[] = [];
    const reader = new RtcmFrameReader({
      frame: (payload) => {
        const station = readStation(payload);
        if (station) stations.push(station);
      },
    });
    for (const byte of bytes) reader.push(Uint8Array.of(byte));
    expect(stations).toHaveLength(21);
    expect(stations[0]).toMatchObject({ x: 2632907.5457, y: 1136956.5893, z: 5677999.5782, stationId: 0 });
    const place = geodeticOf(stations[0]!);
    expect(place.latitude).toBeCloseTo(63.35665315, 8);
    expect(place.longitude).toBeCloseTo(23.35591775, 8);
    expect(place.heightM).toBeCloseTo(93.761, 3);
  });
});
