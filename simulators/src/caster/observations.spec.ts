import { readFileSync } from 'node:fs';
import { unsignedAt } from '@hubtack/contracts/rtcm/bits.js';
import { RtcmFrameReader } from '@hubtack/contracts/rtcm/frame-reader.js';
import { isMsm } from '@hubtack/contracts/rtcm/messages.js';
import { describe, expect, it } from 'vitest';
import { randomOf } from '../scenarios/random.js';
import { biasPayload, legacyPayload, msmPayload } from './observations.js';

/** What the masks of an MSM say that is in it, and the bytes that this takes (MSM4 and MSM7). */
function lookInto(payload: Uint8Array) {
  const ones = (from: number, length: number) =>
    Array.from({ length }, (_, index) => unsignedAt(payload, from + index, 1)).reduce((a, b) => a + b, 0);
  const [satellites, signals] = [ones(73, 64), ones(137, 32)];
  const cells = ones(169, satellites * signals);
  const isFull = unsignedAt(payload, 0, 12) % 10 === 7;
  const [satelliteBits, cellBits] = isFull ? [36, 80] : [18, 48];
  const bytesFor = (count: number) =>
    Math.ceil((169 + satellites * signals + satelliteBits * satellites + cellBits * count) / 8);
  const [bytes, mostBytes] = [bytesFor(cells), bytesFor(satellites * signals)];
  return { satellites, cells, bytes, mostBytes, epoch: unsignedAt(payload, 24, 30) };
}

describe('observation messages', () => {
  it('of a recorded base have the layout and the times that ours have', () => {
    const recording = readFileSync(new URL('../../recordings/aamakinen.rtcm3', import.meta.url));
    const epochs: Record<number, number[]> = { 1077: [], 1084: [], 1097: [], 1127: [] };
    const reader = new RtcmFrameReader({
      frame: (payload, number) => {
        if (!isMsm(number)) return;
        const { bytes, mostBytes, epoch } = lookInto(payload);
        // This base makes room for every signal of every satellite, and leaves zeros where one is not received.
        expect(payload).toHaveLength(mostBytes);
        expect(payload.subarray(bytes).every((byte) => byte === 0)).toBe(true);
        epochs[number]!.push(epoch);
      },
    });
    reader.push(recording);
    const [gps, glonass, galileo, beidou] = Object.values(epochs) as [number[], number[], number[], number[]];
    expect(gps).toEqual(gps.map((_, index) => gps[0]! + index * 1000));
    expect(gps).toHaveLength(22);
    expect(galileo).toEqual(gps.slice(0, 21));
    expect(beidou).toEqual(galileo.map((epoch) => epoch - 14_000));
    // It was a Sunday (day 0): three hours more than UTC, which is 18 s behind GPS.
    expect(glonass).toEqual(galileo.map((epoch) => epoch - 18_000 + 3 * 3_600_000));
  });
  it.each([1077, 1087, 1097, 1127])('%i is as long as its own masks say', (number) => {
    const observed = { number, stationId: 7, satellites: [1, 4, 9], at: Date.UTC(2026, 11, 1, 15) };
    const payload = msmPayload(observed, true, randomOf(1));
    expect(lookInto(payload)).toMatchObject({ satellites: 3, cells: 6, bytes: payload.length });
  });
  it('say the time of their constellation', () => {
    // A Sunday, 0:00:00 UTC: GPS is 18 s ahead, BeiDou 4 s, and in Moscow it is 3 o'clock.
    const at = Date.UTC(2026, 10, 29);
    const epochOf = (number: number) =>
      lookInto(msmPayload({ number, stationId: 7, satellites: [1], at }, true, randomOf(1))).epoch;
    expect([1077, 1097, 1127].map(epochOf)).toEqual([18_000, 18_000, 4000]);
    expect(epochOf(1087)).toBe(3 * 3_600_000);
    const monday = at + 86_400_000;
    const payload = msmPayload(
      { number: 1087, stationId: 7, satellites: [1], at: monday },
      true,
      randomOf(1),
    );
    expect(unsignedAt(payload, 24, 3)).toBe(1);
  });
  it('from before MSM, and code biases, have the length of what is in them', () => {
    const observed = { stationId: 7, satellites: [1, 2, 3], at: 0 };
    expect(legacyPayload({ ...observed, number: 1004 }, true, randomOf(1))).toHaveLength(55);
    expect(legacyPayload({ ...observed, number: 1012 }, true, randomOf(1))).toHaveLength(57);
    expect(biasPayload(7, randomOf(1))).toHaveLength(8);
  });
  it('are the same for the same seed', () => {
    const make = () => msmPayload({ number: 1077, stationId: 7, satellites: [1], at: 0 }, true, randomOf(5));
    expect(make()).toEqual(make());
  });
});
