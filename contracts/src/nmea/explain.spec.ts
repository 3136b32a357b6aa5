import { describe, expect, it } from 'vitest';
import { publishedGga, publishedInvalid } from '../testing/published-sentences.js';
import { degreesMinutesSeconds, explainLine, explainText } from './explain.js';

const reading = (text: string, name: string) =>
  explainLine(text, 1).fields.find((field) => field.name === name);
const published = (id: string) => publishedGga.find((row) => row.id === id)!.text;

describe('degrees, minutes, seconds (geodesy examples; "NMEA Revealed")', () => {
  it.each([
    [45 + 33.35 / 60, '45° 33′ 21.0000″ N'],
    [48.1173, '48° 07′ 02.2800″ N'],
    [-(7.5 / 60), '0° 07′ 30.0000″ S'],
    [10 + 59.9999999999 / 3600, '10° 01′ 00.0000″ N'],
  ])('%d', (degrees, words) => {
    expect(degreesMinutesSeconds(degrees, 'N', 'S')).toBe(words);
  });
});

describe('the sentence reader', () => {
  it('says what a fixed GGA says, field by field', () => {
    const explained = explainLine(published('E8'), 1);
    expect(explained.problem).toBeNull();
    expect(explained.title).toBe('GGA from GN: position and fix quality');
    expect(explained.checksum).toEqual({ given: '6D', computed: '6D' });
    expect(reading(published('E8'), 'Quality')?.reading).toBe('Fixed: RTK, ambiguities fixed');
    expect(reading(published('E8'), 'Age of corrections')?.reading).toBe('5.8 s');
    expect(reading(published('E8'), 'Geoid above the ellipsoid')?.reading).toContain('249.385 m');
  });
  it('never shows what is absent as a number', () => {
    expect(reading(published('E1'), 'Age of corrections')?.reading).toBe('not given');
    expect(reading(published('E18'), 'Latitude')?.reading).toBe('filler, not a place');
  });
  it('warns of too few decimals, of old corrections, and of a missing geoid separation', () => {
    expect(reading(published('E1'), 'Latitude')?.warning).toContain('3 decimals');
    expect(reading(published('E8'), 'Latitude')?.warning).toBeUndefined();
    expect(reading(published('E7'), 'Age of corrections')?.warning).toContain('older than 10 s');
    expect(reading(published('E16'), 'Antenna above the geoid')?.warning).toContain('not known');
  });
  it('says what is wrong and what to try', () => {
    const explained = explainLine(publishedInvalid, 1);
    expect(explained.checksum).toEqual({ given: '47', computed: '56' });
    expect(explained.problem?.advice).toContain('baud rate');
    expect(explainLine('# a comment', 1).problem?.words).toContain('no NMEA 0183 sentence');
    expect(explainLine(published('E8').slice(0, -3), 1).problem?.words).toContain('no checksum');
  });
  it('numbers lines as they stand, whatever ends them', () => {
    expect(explainText(`${published('E1')}\r\n\r\n${published('E2')}\n`).map(({ line }) => line)).toEqual([
      1, 3,
    ]);
  });
});
