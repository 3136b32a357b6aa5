import { describe, expect, it } from 'vitest';
import { checkWords, millimetres } from './set-up-words';

const shot = { at: Date.parse('2026-12-01T20:12:00Z'), horizontalMm: 9, passed: true, again: null };
const zone = 'Australia/Hobart';

describe('a check shot on a lane', () => {
  it('says when, and how far off', () => {
    expect(checkWords(shot, zone)).toMatchObject({ short: 'checked 07:12, 9 mm', counts: true });
    expect(checkWords(null, zone)).toBeNull();
  });
  it('says why it does not count any more', () => {
    expect(checkWords({ ...shot, again: 'baseChanged' }, zone)).toEqual({
      short: 'check again',
      long: 'Check again: the base has changed. The last check was at 07:12, 9 mm off.',
      counts: false,
    });
  });
  it('says that it failed', () => {
    expect(checkWords({ ...shot, horizontalMm: 71, passed: false }, zone)).toMatchObject({
      short: 'check failed 07:12',
      counts: false,
    });
  });
});
it.each([
  [0.0092, '+9 mm'],
  [-0.0118, '−12 mm'],
  [0.0004, '0 mm'],
  [-0.0004, '0 mm'],
  [-1.6449, '−1.645 m'],
])('%f m is %s', (metres, words) => {
  expect(millimetres(metres)).toBe(words);
});
