import { DAY_MS } from '@hubtack/contracts/nmea/sentence.js';
import { writeGga, writeRmc, writeZda } from '@hubtack/contracts/nmea/sentence-writer.js';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { SentenceBatch } from '../ingest/sentence.batch.js';
import { FirstDayFinder } from './first-day.js';

const arrival = Date.UTC(2026, 9, 8, 7, 30);
const noon = Date.UTC(2026, 9, 7, 12);
const place = { latitude: -41, longitude: 147 };
const gga = (time: number) =>
  writeGga({
    ...place,
    time,
    quality: 4,
    satellites: 20,
    hdop: 0.7,
    altitudeM: 40,
    geoidSeparationM: -3,
    ageSeconds: 1,
    stationId: 1,
  });
const rmc = (time: number) => writeRmc({ ...place, time });
const bytes = (text: string) => new TextEncoder().encode(text);
const found = (text: string) => {
  const finder = new FirstDayFinder(arrival);
  finder.push(bytes(text));
  return finder.finish();
};
const day = (time: number) => Math.floor(time / DAY_MS);

describe('the day of the first sentence', () => {
  it('is that of the first date', () => {
    expect(found(rmc(noon) + gga(noon))).toEqual({ day: day(noon), from: 'sentences' });
    expect(found(writeZda({ time: noon }))).toEqual({ day: day(noon), from: 'sentences' });
  });
  it('goes back over midnights to before the first date', () => {
    const times = Array.from({ length: 60 }, (_, hour) => noon + hour * 3_600_000);
    expect(found(times.map(gga).join('') + rmc(times.at(-1)!))).toEqual({
      day: day(noon),
      from: 'sentences',
    });
  });
  it('a week-number rollover is no date ("NMEA Revealed"): the arrival says', () => {
    const rolledOver = noon - 1024 * 7 * DAY_MS;
    expect(found(rmc(rolledOver) + gga(rolledOver))).toEqual({ day: day(noon), from: 'arrival' });
  });
  it('by the arrival: the nearest day that is not in the future', () => {
    expect(found(gga(noon))?.day).toBe(day(noon));
    expect(found(gga(arrival - 60_000))?.day).toBe(day(arrival));
    // A clock that is a little ahead is not a day behind.
    expect(found(gga(arrival + 60_000))?.day).toBe(day(arrival));
  });
  it('without any time of day there is none', () => {
    expect(found('no sentence')).toBeNull();
    expect(new FirstDayFinder(arrival).finish()).toBeNull();
  });
});

it('a log read from that day gives the epochs that a post of it gives', () => {
  const step = fc.integer({ min: 0, max: 11 * 3_600_000 });
  const sentence = fc.record({ step, isDated: fc.boolean() });
  fc.assert(
    fc.property(fc.array(sentence, { minLength: 1, maxLength: 30 }), fc.nat(29), (list, datedAt) => {
      let time = noon - 20 * DAY_MS;
      const lines = list.map((one, index) => {
        time += Math.round(one.step / 10) * 10;
        // One date at least: without any a post is dated by the clock, sentence by sentence.
        return gga(time) + (one.isDated || index === datedAt % list.length ? rmc(time) : '');
      });
      const text = bytes(lines.join(''));
      const limits = { now: arrival, rawEpochDays: 100_000 };
      const timesBy = (statedDay: number | null) => {
        const batch = new SentenceBatch(statedDay);
        batch.push(text, arrival);
        batch.finish();
        return batch.take(limits).epochs.map((epoch) => epoch.time);
      };
      const finder = new FirstDayFinder(arrival);
      finder.push(text);
      expect(timesBy(finder.finish()!.day)).toEqual(timesBy(null));
    }),
  );
});
