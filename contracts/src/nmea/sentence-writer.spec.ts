import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { publishedGga, publishedOthers } from '../testing/published-sentences.js';
import { readText } from '../testing/read-text.js';
import { DAY_MS, type GgaSentence } from './sentence.js';
import { angleText, checksumOf, writeGga, writeGst, writeRmc, writeZda } from './sentence-writer.js';

describe('the sentence writer', () => {
  it('gives the published checksums', () => {
    for (const { text } of [...publishedGga, ...publishedOthers])
      expect(checksumOf(text.slice(1, -3))).toBe(text.slice(-2));
  });
  it('writes a published sentence as it was published (E8 of the gpsd regression log)', () => {
    const text = writeGga({
      time: Date.parse('2020-03-18T13:38:59.800Z'),
      latitude: 41 + 34.50180205 / 60,
      longitude: -(93 + 45.03586649 / 60),
      quality: 4,
      satellites: 19,
      hdop: 0.7,
      altitudeM: 280.827,
      geoidSeparationM: -31.442,
      ageSeconds: 5.8,
      stationId: 2,
    });
    expect(text).toBe(`${publishedGga.find(({ id }) => id === 'E8')!.text}\r\n`);
  });
  it('carries 59.999... minutes into the next degree, and keeps leading noughts', () => {
    expect(angleText(47.9999999999, 2, 4)).toBe('4800.0000');
    expect(angleText(0.125, 3, 3)).toBe('00007.500');
    expect(angleText(-9.5, 2, 2)).toBe('0930.00');
  });
  it('leaves absent values empty', () => {
    const absent = {
      satellites: null,
      hdop: null,
      altitudeM: null,
      geoidSeparationM: null,
      ageSeconds: null,
    };
    const text = writeGga({
      time: 0,
      latitude: null,
      longitude: null,
      quality: 0,
      stationId: null,
      ...absent,
    });
    expect(text).toContain('GNGGA,000000.00,,,,,0,,,,M,,M,,*');
  });
  it('what it writes is read back the same', () => {
    const nullable = <T>(value: fc.Arbitrary<T>) => fc.option(value, { nil: null });
    fc.assert(
      fc.property(
        fc.record({
          time: fc.integer({ min: 0, max: 8_639_999 }).map((hundredth) => hundredth * 10),
          latitude: fc.double({ min: -90, max: 90, noNaN: true }),
          longitude: fc.double({ min: -180, max: 180, noNaN: true }),
          quality: fc.integer({ min: 1, max: 9 }),
          satellites: nullable(fc.integer({ min: 0, max: 60 })),
          hdop: nullable(fc.integer({ min: 0, max: 999 }).map((tenths) => tenths / 10)),
          altitudeM: nullable(fc.integer({ min: -500_000, max: 9_000_000 }).map((mm) => mm / 1000)),
          geoidSeparationM: nullable(fc.integer({ min: -120_000, max: 120_000 }).map((mm) => mm / 1000)),
          ageSeconds: nullable(fc.integer({ min: 0, max: 9999 }).map((tenths) => tenths / 10)),
          stationId: nullable(fc.integer({ min: 0, max: 4095 })),
        }),
        (values) => {
          const { sentences, faults } = readText(writeGga(values));
          expect(faults).toEqual([]);
          const gga = sentences[0] as GgaSentence;
          const { satellites, hdop, altitudeM, geoidSeparationM, stationId, quality } = values;
          expect(gga).toMatchObject({ satellites, hdop, altitudeM, geoidSeparationM, stationId, quality });
          expect(gga.timeOfDayMs).toBe(values.time % DAY_MS);
          expect(gga.ageMs).toBe(values.ageSeconds === null ? null : Math.round(values.ageSeconds * 1000));
          // Eight decimals of a minute: half a unit is 8.4e-11 degrees.
          if (gga.latitude !== null) expect(Math.abs(gga.latitude - values.latitude)).toBeLessThan(1e-10);
          if (gga.longitude !== null) expect(Math.abs(gga.longitude - values.longitude)).toBeLessThan(1e-10);
        },
      ),
      { numRuns: 2000 },
    );
  });
  it('writes RMC and ZDA with the date and GST with the sigmas', () => {
    const time = Date.parse('2026-10-04T02:30:00Z');
    const { sentences } = readText(
      writeRmc({ time, latitude: -41.4, longitude: 147.1 }) +
        writeZda({ time }) +
        writeGst({ time, sigmaM: 0.008, sigmaAltitudeM: 0.015 }),
    );
    expect(sentences).toMatchObject([
      { type: 'date', from: 'RMC', day: Date.parse('2026-10-04') / DAY_MS, valid: true },
      { type: 'date', from: 'ZDA', day: Date.parse('2026-10-04') / DAY_MS, timeOfDayMs: 9_000_000 },
      { type: 'gst', sigmaLatitudeM: 0.008, sigmaAltitudeM: 0.015 },
    ]);
  });
});
