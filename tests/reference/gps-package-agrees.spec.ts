import { readText } from '@hubtack/contracts/testing/read-text.js';
import type { GgaSentence } from '@hubtack/contracts/nmea/sentence.js';
import { writeGga } from '@hubtack/contracts/nmea/sentence-writer.js';
import { GPS } from 'gps';
import { expect, it } from 'vitest';

// The npm package `gps` 0.9.0: an independent reader of NMEA 0183. Compared where both read the field: it keeps absent
// values as null, and gives the time with today's date, so the time of day is taken from it.
const SENTENCES = 100_000;

/** A small seeded generator (mulberry32, public domain; from memory): the same sentences at every run. */
function seeded(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let value = Math.imul(state ^ (state >>> 15), 1 | state);
    value = (value + Math.imul(value ^ (value >>> 7), 61 | value)) ^ value;
    return ((value ^ (value >>> 14)) >>> 0) / 4_294_967_296;
  };
}

interface GpsGga {
  time: Date | null;
  lat: number | null;
  lon: number | null;
  alt: number | null;
  quality: string | null;
  satellites: number | null;
  hdop: number | null;
  geoidal: number | null;
  age: number | null;
  stationID: number | null;
  valid: boolean;
}

/** What the package calls the quality digits it knows. */
const qualityNames: Record<number, string> = {
  1: 'fix',
  2: 'dgps-fix',
  3: 'pps-fix',
  4: 'rtk',
  5: 'rtk-float',
  6: 'estimated',
  7: 'manual',
  8: 'simulated',
};

it('the parser agrees with the gps package on 100,000 generated sentences', () => {
  const random = seeded(20_261_201);
  const or = <T>(value: T): T | null => (random() < 0.1 ? null : value);
  const disagreements: string[] = [];
  for (let index = 0; index < SENTENCES; index++) {
    const quality = 1 + Math.floor(random() * 8);
    const text = writeGga({
      talker: ['GP', 'GN', 'GL', 'GA'][Math.floor(random() * 4)]!,
      time: Math.floor(random() * 8_640_000) * 10,
      latitude: random() * 180 - 90,
      longitude: random() * 360 - 180,
      quality,
      satellites: or(Math.floor(random() * 45)),
      hdop: or(Math.round(random() * 99) / 10),
      altitudeM: or(Math.round(random() * 4e6) / 1000),
      geoidSeparationM: or(Math.round(random() * 2e5 - 1e5) / 1000),
      ageSeconds: or(Math.round(random() * 300) / 10),
      stationId: or(Math.floor(random() * 1024)),
      minuteDecimals: 3 + Math.floor(random() * 6),
    });
    const ours = readText(text).sentences[0] as GgaSentence;
    const theirs = GPS.Parse(text.trim()) as unknown as GpsGga;
    const differ =
      !theirs.valid ||
      Math.abs(ours.latitude! - theirs.lat!) > 1e-9 ||
      Math.abs(ours.longitude! - theirs.lon!) > 1e-9 ||
      ours.satellites !== theirs.satellites ||
      ours.hdop !== theirs.hdop ||
      ours.altitudeM !== theirs.alt ||
      ours.geoidSeparationM !== theirs.geoidal ||
      (ours.ageMs === null ? theirs.age !== null : Math.abs(ours.ageMs / 1000 - theirs.age!) > 1e-6) ||
      ours.stationId !== theirs.stationID ||
      qualityNames[ours.quality] !== theirs.quality ||
      ours.timeOfDayMs! !== theirs.time!.getTime() % 86_400_000;
    if (differ)
      disagreements.push(`${text.trim()} ours ${JSON.stringify(ours)} theirs ${JSON.stringify(theirs)}`);
  }
  expect(disagreements.slice(0, 3)).toEqual([]);
});
