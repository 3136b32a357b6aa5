import { describe, expect, it } from 'vitest';
import { publishedGga, publishedInvalid, publishedOthers } from '../testing/published-sentences.js';
import { readText } from '../testing/read-text.js';
import { DAY_MS, type DateSentence, type GgaSentence, type GstSentence, type Sentence } from './sentence.js';

/** The one sentence in a text, of the kind that the test expects. */
const one = <T extends Sentence>(text: string): T => {
  const { sentences, faults, noise } = readText(`${text}\r\n`);
  expect({ faults, noise, count: sentences.length }).toEqual({ faults: [], noise: [], count: 1 });
  return sentences[0] as T;
};
const checksummed = (body: string): string => {
  let sum = 0;
  for (const character of body) sum ^= character.charCodeAt(0);
  return `$${body}*${sum.toString(16).toUpperCase().padStart(2, '0')}`;
};
const rejected = (body: string) => {
  const [sentence] = readText(checksummed(body)).sentences;
  return sentence?.type === 'fault' ? sentence.code : sentence?.type;
};

describe('published sentences', () => {
  it.each(publishedGga)(
    '$id reads as published',
    ({ text, at, quality, satellites, hdop, ageMs, stationId }) => {
      const gga = one<GgaSentence>(text);
      expect(gga).toMatchObject({ type: 'gga', quality, satellites, hdop, ageMs, stationId });
      if (at === null) expect([gga.latitude, gga.longitude]).toEqual([null, null]);
      else {
        expect(gga.latitude).toBeCloseTo(at[0], 7);
        expect(gga.longitude).toBeCloseTo(at[1], 7);
      }
    },
  );

  it('keeps geoid separation absent when it is missing (E16), and altitude in metres', () => {
    const gga = one<GgaSentence>(publishedGga.find(({ id }) => id === 'E16')!.text);
    expect([gga.altitudeM, gga.geoidSeparationM]).toEqual([221.883, null]);
    const negative = one<GgaSentence>(publishedGga.find(({ id }) => id === 'E4')!.text);
    expect([negative.altitudeM, negative.geoidSeparationM]).toEqual([-25, 21]);
  });

  it.each(publishedOthers.filter((row) => row.type === 'gst'))('$id gives its sigmas', ({ text, sigmas }) => {
    const gst = one<GstSentence>(text);
    expect([gst.sigmaLatitudeM, gst.sigmaLongitudeM, gst.sigmaAltitudeM]).toEqual(sigmas);
  });

  it.each(publishedOthers.filter((row) => row.type === 'date'))(
    '$id gives $date',
    ({ text, date, valid }) => {
      const sentence = one<DateSentence>(text);
      expect(new Date(sentence.day! * DAY_MS).toISOString().slice(0, 10)).toBe(date);
      expect(sentence.valid).toBe(valid);
    },
  );

  it('refuses the published sentence whose checksum is wrong', () => {
    const { sentences, faults } = readText(publishedInvalid);
    expect(sentences).toEqual([]);
    expect(faults).toMatchObject([{ code: 'badChecksum', detail: expect.stringContaining('56') }]);
  });
});

describe('degrees and minutes ("NMEA Revealed": .35 of a minute is exactly 21 seconds; 16708.033)', () => {
  const position = (latitude: string, longitude: string) => {
    const gga = one<GgaSentence>(checksummed(`GPGGA,120000,${latitude},${longitude},1,08,1.0,10,M,0,M,,`));
    return [gga.latitude!, gga.longitude!];
  };
  it('45 deg 33.35 min is 45 deg 33 min 21 s; 167 deg 8.033 min', () => {
    const [latitude, longitude] = position('4533.35,N', '16708.033,E');
    expect(latitude).toBe(45 + 33.35 / 60);
    expect(longitude).toBeCloseTo(167.1338833, 7);
  });
  it('0007.5 is 7.5 minutes, and its sign survives below one degree', () => {
    expect(position('0007.5,S', '00007.5,W')).toEqual([-0.125, -0.125]);
  });
  it('keeps eight decimals of a minute: 1e-8 min is 0.02 mm of latitude', () => {
    const [fine] = position('4134.49795459,N', '09345.0,W');
    const [next] = position('4134.49795460,N', '09345.0,W');
    expect(next! - fine!).toBeGreaterThan(0);
    expect(fine).toBe(41 + 34.49795459 / 60);
  });
});

describe('irregularities a parser meets', () => {
  const gga = (quality: string, rest = '08,1.0,10,M,0,M,,') =>
    `GPGGA,120000,4807.038,N,01131.000,E,${quality},${rest}`;

  it('empty age is unknown, 0.0 and 0000 are ages', () => {
    const age = (text: string) => one<GgaSentence>(checksummed(gga('4', `08,1.0,10,M,0,M,${text},`))).ageMs;
    expect([age(''), age('0.0'), age('0000'), age('6.6')]).toEqual([null, 0, 0, 6600]);
  });
  it.each(['', '12', 'A', '-1', '4.0'])('quality "%s" is not one known digit', (quality) => {
    expect(rejected(gga(quality))).toBe('badQuality');
  });
  it('quality 9 is read, not refused', () => {
    expect(one<GgaSentence>(checksummed(gga('9'))).quality).toBe(9);
  });
  it.each([
    ['4860.000,N,01131.000,E', 'sixty minutes'],
    ['9100.000,N,01131.000,E', 'beyond the pole'],
    ['4807.038,X,01131.000,E', 'no such side'],
    ['4807.038,,01131.000,E', 'side missing'],
    ['48x7.038,N,01131.000,E', 'a letter'],
    ['4807.038,N,1131.000,E', 'two degree digits of longitude'],
  ])('position %s is refused (%s)', (position) => {
    expect(rejected(`GPGGA,120000,${position},1,08,1.0,10,M,0,M,,`)).toBe('badField');
  });
  it.each(['246000', '126000', '120061', '1200', '12000x', '120000:5'])('time %s is refused', (time) => {
    expect(rejected(`GPGGA,${time},4807.038,N,01131.000,E,1,08,1.0,10,M,0,M,,`)).toBe('badField');
  });
  it('second 60 is a leap second: the start of the next minute', () => {
    const time = (text: string) =>
      one<GgaSentence>(checksummed(`GPGGA,${text},4807.038,N,01131.000,E,1,08,1.0,10,M,0,M,,`)).timeOfDayMs;
    expect([time('235960'), time('235960.00'), time('235959.99')]).toEqual([DAY_MS, DAY_MS, DAY_MS - 10]);
  });
  it('0,0 never becomes a place, whatever the quality', () => {
    const zero = one<GgaSentence>(checksummed('GPGGA,120000,0000.000,N,00000.000,E,1,08,1.0,10,M,0,M,,'));
    expect([zero.latitude, zero.longitude]).toEqual([null, null]);
  });
  it('keys on the last three letters, and never on proprietary sentences', () => {
    expect(one<GgaSentence>(checksummed(gga('4').replace('GPGGA', 'QZGGA'))).talker).toBe('QZ');
    expect(one(checksummed('PXGGA,1,2,3,4,5,6,7,8')).type).toBe('other');
    expect(one(checksummed('GNGGK,120000,010120,4807.038,N,01131.000,E,3,08,1,EHT1,M')).type).toBe('other');
  });
  it('a date that does not exist is refused, a missing one is unknown', () => {
    expect(rejected('GPRMC,120000,A,4807.038,N,01131.000,E,0,0,310221,,')).toBe('badField');
    expect(rejected('GPZDA,120000,31,04,2024,,')).toBe('badField');
    expect(one<DateSentence>(checksummed('GPRMC,120000,V,,,,,,,,,')).day).toBeNull();
  });
  it('the two-digit year of RMC: 80 to 99 are of the last century', () => {
    const year = (text: string) =>
      new Date(
        one<DateSentence>(checksummed(`GPRMC,120000,V,,,,,,,${text},,`)).day! * DAY_MS,
      ).getUTCFullYear();
    expect([year('060180'), year('311299'), year('010100'), year('311279')]).toEqual([
      1980, 1999, 2000, 2079,
    ]);
  });
});
