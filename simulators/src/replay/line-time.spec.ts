import { writeGga, writeRmc, writeZda } from '@hubtack/contracts/nmea/sentence-writer.js';
import { DAY_MS } from '@hubtack/contracts/nmea/sentence.js';
import { describe, expect, it } from 'vitest';
import { LogClock, firstDayOf, sentencesIn } from './line-time.js';

const at = (text: string) => Date.parse(text);
const absent = {
  satellites: null,
  hdop: null,
  altitudeM: null,
  geoidSeparationM: null,
  ageSeconds: null,
  stationId: null,
};
const bytes = (text: string) => new TextEncoder().encode(text);
const gga = (text: string) =>
  bytes(writeGga({ time: at(text), latitude: 1, longitude: 2, quality: 4, ...absent }));
const rmc = (text: string, latitude: number | null = 1) =>
  bytes(writeRmc({ time: at(text), latitude, longitude: 2 }));
const zda = (text: string) => bytes(writeZda({ time: at(text) }));

/** Takes lines, each with when it was read (null: a stored log), and tells what the clock says after each. */
function clockAfter(clock: LogClock, lines: [Uint8Array, string | null][]): (string | null)[] {
  return lines.map(([line, readAt]) => {
    clock.take(sentencesIn(line), readAt === null ? null : at(readAt));
    return clock.now === null ? null : new Date(clock.now).toISOString().replace('.000Z', 'Z');
  });
}

describe('a stored log', () => {
  it('knows no date before one is told, and goes on from it over midnight, forward and back', () => {
    const said = clockAfter(new LogClock(), [
      [gga('2026-03-09T23:59:58Z'), null],
      [zda('2026-03-09T23:59:59Z'), null],
      [gga('2026-03-10T00:00:01Z'), null],
      [gga('2026-03-09T23:59:59Z'), null],
      [gga('2026-03-10T00:00:02Z'), null],
    ]);
    expect(said).toEqual([
      null,
      '2026-03-09T23:59:59Z',
      '2026-03-10T00:00:01Z',
      '2026-03-09T23:59:59Z',
      '2026-03-10T00:00:02Z',
    ]);
  });
  it('a stated date stands against the date the receiver tells', () => {
    const said = clockAfter(new LogClock(at('2026-03-09') / DAY_MS, true), [
      [rmc('2006-07-24T10:00:00Z'), null],
    ]);
    expect(said).toEqual(['2026-03-09T10:00:00Z']);
  });
  it('a power-up date that the receiver does not vouch for is none', () => {
    const lines = [rmc('1980-01-06T00:00:10Z', null), rmc('2026-03-09T10:00:00Z')];
    expect(firstDayOf(lines)).toBe(at('2026-03-09') / DAY_MS);
  });
});

describe('a live receiver', () => {
  it('without a date of its own: a night switched off puts it into the next day', () => {
    const said = clockAfter(new LogClock(), [
      [gga('2026-03-09T18:00:00Z'), '2026-03-09T18:00:00.3Z'],
      [gga('2026-03-10T07:00:00Z'), '2026-03-10T07:00:00.3Z'],
      [gga('2026-03-10T23:59:59Z'), '2026-03-11T00:00:00.3Z'],
    ]);
    expect(said).toEqual(['2026-03-09T18:00:00Z', '2026-03-10T07:00:00Z', '2026-03-10T23:59:59Z']);
  });
  it('with one: the same, though the first sentence of the morning comes before the RMC, and the reader’s clock is wrong', () => {
    const said = clockAfter(new LogClock(), [
      [rmc('2026-03-09T18:00:00Z'), '2024-01-01T00:00:00Z'],
      [gga('2026-03-10T07:00:00Z'), '2024-01-01T13:00:00Z'],
    ]);
    expect(said).toEqual(['2026-03-09T18:00:00Z', '2026-03-10T07:00:00Z']);
  });
  it('a week-number rollover is not believed', () => {
    const said = clockAfter(new LogClock(), [[rmc('2006-07-24T10:00:00Z'), '2026-03-09T10:00:00.4Z']]);
    expect(said).toEqual(['2026-03-09T10:00:00Z']);
  });
});
