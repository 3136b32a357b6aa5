import { FrameReader } from '@hubtack/contracts/nmea/frame-reader.js';
import { readSentence } from '@hubtack/contracts/nmea/sentence.js';
import { describe, expect, it } from 'vitest';
import { EpochAssembler } from './epoch.assembler.js';

const NOW = Date.parse('2026-03-10T12:00:00Z');
const DAY = (date: string) => Date.parse(date) / 86_400_000;

const checksummed = (body: string): string => {
  let sum = 0;
  for (const character of body) sum ^= character.charCodeAt(0);
  return `$${body}*${sum.toString(16).padStart(2, '0')}\r\n`;
};
const gga = (time: string, quality = 4, talker = 'GN') =>
  checksummed(`${talker}GGA,${time},4126.4,S,14708.4,E,${quality},12,0.8,20.0,M,-3.0,M,1.0,0001`);
const rmc = (time: string, date: string, status = 'A') =>
  checksummed(`GNRMC,${time},${status},4126.4,S,14708.4,E,0.0,0.0,${date},,,R`);
const zda = (time: string, date: string) => checksummed(`GNZDA,${time},${date},00,00`);
const gst = (time: string) => checksummed(`GNGST,${time},0.1,,,,0.010,0.011,0.020`);

function feed(assembler: EpochAssembler, text: string, receivedAt = NOW): void {
  const reader = new FrameReader();
  reader.push(new TextEncoder().encode(text), {
    sentence: (bytes, start, end, line) => assembler.push(readSentence(bytes, start, end), line, receivedAt),
    fault: (code) => expect.unreachable(code),
    noise: () => expect.unreachable('noise'),
  });
}
/** One post or file: times of its epochs, and lines that nobody can date. */
function post(text: string, { date, receivedAt = NOW }: { date?: string; receivedAt?: number } = {}) {
  const assembler = new EpochAssembler(date === undefined ? null : DAY(date));
  feed(assembler, text, receivedAt);
  assembler.finish();
  const { epochs, untimed } = assembler.take();
  return { times: epochs.map(({ epoch }) => new Date(epoch.time).toISOString()), untimed, epochs };
}
const timesOf = (assembler: EpochAssembler) =>
  assembler.take().epochs.map(({ epoch }) => new Date(epoch.time).toISOString());

describe('the date that a GGA does not carry', () => {
  it('is the one nearest to the arrival, over midnight both ways', () => {
    const justAfter = Date.parse('2026-03-10T00:00:05Z');
    const justBefore = Date.parse('2026-03-09T23:59:58Z');
    expect(post(gga('235959'), { receivedAt: justAfter }).times).toEqual(['2026-03-09T23:59:59.000Z']);
    expect(post(gga('000002'), { receivedAt: justBefore }).times).toEqual(['2026-03-10T00:00:02.000Z']);
  });
  it('comes from an RMC or ZDA anywhere in the post, also for sentences before it', () => {
    const text = gga('132819.60') + gga('132819.70') + rmc('132819.70', '180320') + gga('132819.80');
    expect(post(text).times).toEqual([
      '2020-03-18T13:28:19.600Z',
      '2020-03-18T13:28:19.700Z',
      '2020-03-18T13:28:19.800Z',
    ]);
    expect(post(zda('132819.60', '18,03,2020') + gga('132819.60')).times).toEqual([
      '2020-03-18T13:28:19.600Z',
    ]);
  });
  it('goes on over midnight, with and without another date sentence', () => {
    const text = rmc('235958', '311219') + gga('235958') + gga('235959') + gga('000000') + gga('000001');
    expect(post(text).times.at(-1)).toBe('2020-01-01T00:00:01.000Z');
    expect(post(gga('235959') + rmc('000000', '010120') + gga('000000')).times).toEqual([
      '2019-12-31T23:59:59.000Z',
      '2020-01-01T00:00:00.000Z',
    ]);
  });
  it('follows a later RMC over a gap that the time of day alone would hide', () => {
    const text = rmc('080000', '010320') + gga('080000') + gga('070000') + rmc('070000', '050320');
    expect(post(text).times).toEqual(['2020-03-01T08:00:00.000Z', '2020-03-05T07:00:00.000Z']);
  });
  it('is the stated one for stored sentences, counted on over midnight', () => {
    expect(post(gga('235959') + gga('000000'), { date: '2026-03-01' }).times).toEqual([
      '2026-03-01T23:59:59.000Z',
      '2026-03-02T00:00:00.000Z',
    ]);
  });
  it('a stated date stands against a device that is years off', () => {
    const text = gga('100000') + rmc('100000', '220706') + gga('100001') + rmc('100001', '220706');
    expect(post(text, { date: '2026-03-08' }).times).toEqual([
      '2026-03-08T10:00:00.000Z',
      '2026-03-08T10:00:01.000Z',
    ]);
  });
  it('a week-number rollover (1024 weeks off) is not believed; a log of that age less a month is', () => {
    const rollover = new Date(NOW - 7168 * 86_400_000);
    expect(rollover.toISOString().slice(0, 10)).toBe('2006-07-25');
    expect(post(rmc('115959', '250706') + gga('115959')).times).toEqual(['2026-03-10T11:59:59.000Z']);
    expect(post(rmc('115959', '250606') + gga('115959')).times).toEqual(['2006-06-25T11:59:59.000Z']);
  });
  it('a power-up default that the receiver does not vouch for is not believed', () => {
    expect(post(rmc('115959', '060180', 'V') + gga('115959', 0)).times).toEqual(['2026-03-10T11:59:59.000Z']);
  });
  it('leap second: 23:59:60 is the midnight that follows', () => {
    expect(post(rmc('235960', '311216') + gga('235960')).times).toEqual(['2017-01-01T00:00:00.000Z']);
  });
});

describe('sentences of one instant', () => {
  it('joins a GST on its time, after or before the GGA', () => {
    for (const text of [gga('120000') + gst('120000'), gst('120000') + gga('120000')])
      expect(post(text).epochs[0]!.epoch).toMatchObject({ sigmaLatitudeM: 0.01, sigmaAltitudeM: 0.02 });
  });
  it('a GST that comes in a later chunk of a live stream is handed on for its epoch', () => {
    const assembler = new EpochAssembler();
    feed(assembler, rmc('120000', '100326') + gga('120000'));
    assembler.settle(NOW);
    expect(timesOf(assembler)).toEqual(['2026-03-10T12:00:00.000Z']);
    feed(assembler, gst('120000'));
    expect(assembler.take().sigmas).toMatchObject([{ time: NOW, sigmaLongitudeM: 0.011 }]);
  });
  it('a GGA without a time takes that of the RMC of its group, before or after it', () => {
    expect(post(rmc('120000', '100326') + gga('')).times).toEqual(['2026-03-10T12:00:00.000Z']);
    expect(post(gga('') + rmc('120000', '100326')).times).toEqual(['2026-03-10T12:00:00.000Z']);
  });
  it('a GGA without any time is placed at its arrival when live, and skipped when stored', () => {
    expect(post(gga('', 0)).times).toEqual(['2026-03-10T12:00:00.000Z']);
    expect(post(gga('', 0), { date: '2026-03-01' }).untimed).toEqual([1]);
    expect(post(rmc('132819', '180320') + gga('132819') + gga('', 0)).untimed).toEqual([3]);
  });
});

describe('a live stream', () => {
  it('keeps the first sentences for up to a second, because their date may follow', () => {
    const assembler = new EpochAssembler();
    feed(assembler, gga('132819.60'));
    expect(assembler.settle(NOW)).toBe(true);
    expect(timesOf(assembler)).toEqual([]);
    feed(assembler, rmc('132819.60', '180320'));
    expect(assembler.settle(NOW)).toBe(false);
    expect(timesOf(assembler)).toEqual(['2020-03-18T13:28:19.600Z']);
  });
  it('goes by the clock when no date has come in that second', () => {
    const assembler = new EpochAssembler();
    feed(assembler, gga('115959'));
    expect(assembler.settle(NOW + 1000)).toBe(false);
    expect(timesOf(assembler)).toEqual(['2026-03-10T11:59:59.000Z']);
    feed(assembler, gga('120001'), NOW + 1100);
    expect(assembler.settle(NOW + 1100)).toBe(false);
    expect(timesOf(assembler)).toEqual(['2026-03-10T12:00:01.000Z']);
  });
  it('goes on by the clock after a night without sentences', () => {
    const assembler = new EpochAssembler();
    feed(assembler, rmc('120000', '100326') + gga('120000'));
    assembler.settle(NOW);
    const nextMorning = NOW + 20 * 3_600_000;
    feed(assembler, gga('080000'), nextMorning);
    assembler.settle(nextMorning);
    expect(timesOf(assembler)).toEqual(['2026-03-10T12:00:00.000Z', '2026-03-11T08:00:00.000Z']);
  });
});
