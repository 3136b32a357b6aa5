import { writeBits } from '@hubtack/contracts/rtcm/bits.js';
import { constellationOf } from '@hubtack/contracts/rtcm/messages.js';
import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import { between } from '../scenarios/random.js';

/**
 * Observation messages as a base sends them: heads that can be read (RTCM 10403.x; widths from memory, those of MSM checked against
 * a recording in the spec), and random numbers where the measurements stand. No position can be computed with them.
 */

const GPS_BEGAN_AT = Date.UTC(1980, 0, 6);
const WEEK_MS = 604_800_000;
const DAY_MS = 86_400_000;
/** Leap seconds since 1980, of which BeiDou time does not count the first fourteen. */
const GPS_AHEAD_MS = 18_000;
const BEIDOU_BEHIND_GPS_MS = 14_000;
const MOSCOW_AHEAD_MS = 3 * 3_600_000;

const gpsWeekMs = (at: number): number => (at - GPS_BEGAN_AT + GPS_AHEAD_MS) % WEEK_MS;
const glonassDay = (at: number) => ({
  day: new Date(at + MOSCOW_AHEAD_MS).getUTCDay(),
  ms: (at + MOSCOW_AHEAD_MS) % DAY_MS,
});

/** The 30 bits of the time of an MSM: the week's millisecond, or for GLONASS day of the week and millisecond of the day. */
function epochOf(constellation: string | null, at: number): number {
  if (constellation === 'GLONASS') {
    const { day, ms } = glonassDay(at);
    return day * 2 ** 27 + ms;
  }
  return constellation === 'BeiDou'
    ? (gpsWeekMs(at) - BEIDOU_BEHIND_GPS_MS + WEEK_MS) % WEEK_MS
    : gpsWeekMs(at);
}

/** Fields from bit 0 on, as [width, value]; random bits up to `bits`, and zeros to the end of the byte. */
function payloadOf(fields: readonly [number, number][], bits: number, random: RandomGenerator): Uint8Array {
  const payload = Uint8Array.from({ length: Math.ceil(bits / 8) }, () => between(random, 0, 255));
  let at = 0;
  for (const [width, value] of fields) {
    writeBits(payload, at, width, value);
    at += width;
  }
  writeBits(payload, bits, payload.length * 8 - bits, 0);
  return payload;
}

export interface Observed {
  number: number;
  stationId: number;
  /** Ids from 1 on. */
  satellites: readonly number[];
  /** UTC, ms. */
  at: number;
}

/** MSM7 signal ids: one on the first frequency and one on the second (from memory). */
const SIGNALS: Record<string, readonly number[]> = {
  GPS: [2, 16],
  GLONASS: [2, 8],
  Galileo: [2, 15],
  BeiDou: [2, 14],
};
const mask = (ids: readonly number[], length: number): [number, number][] =>
  Array.from({ length }, (_, index) => [1, ids.includes(index + 1) ? 1 : 0]);

/** An MSM7 in which each satellite has both signals. `isLast`: no more messages of this instant follow. */
export function msmPayload(observed: Observed, isLast: boolean, random: RandomGenerator): Uint8Array {
  const { number, stationId, satellites, at } = observed;
  const constellation = constellationOf(number);
  const signals = SIGNALS[constellation ?? ''] ?? [2];
  const cells = satellites.length * signals.length;
  const fields: [number, number][] = [
    [12, number],
    [12, stationId],
    [30, epochOf(constellation, at)],
    [1, isLast ? 0 : 1],
    // Issue of data station, reserved, clock steering, external clock, smoothing and its interval.
    [18, 0],
    ...mask(satellites, 64),
    ...mask(signals, 32),
    ...Array.from({ length: cells }, (): [number, number] => [1, 1]),
  ];
  return payloadOf(fields, 169 + cells + 36 * satellites.length + 80 * cells, random);
}

/** Message 1004 or 1012. */
export function legacyPayload(observed: Observed, isLast: boolean, random: RandomGenerator): Uint8Array {
  const { number, stationId, satellites, at } = observed;
  const isGps = number === 1004;
  const head: [number, number][] = [
    [12, number],
    [12, stationId],
    isGps ? [30, gpsWeekMs(at)] : [27, glonassDay(at).ms],
    [1, isLast ? 0 : 1],
    [5, satellites.length],
    [4, 0],
  ];
  const bits = isGps ? 64 + 125 * satellites.length : 61 + 130 * satellites.length;
  return payloadOf(head, bits, random);
}

/** Message 1230 with the biases of two signals. */
export const biasPayload = (stationId: number, random: RandomGenerator): Uint8Array =>
  payloadOf(
    [
      [12, 1230],
      [12, stationId],
      [4, 8],
      [4, 0b1010],
    ],
    64,
    random,
  );
