import { expect, it } from 'vitest';
import { fieldText, instantOf } from './zone-time';

it('goes there and back in the firm’s zone, on either side of a change of clocks', () => {
  const zone = 'Australia/Hobart';
  expect(fieldText(Date.parse('2026-12-01T20:05:00Z'), zone)).toBe('2026-12-02T07:05');
  expect(instantOf('2026-12-02T07:05', zone)).toBe('2026-12-01T20:05:00.000Z');
  expect(instantOf('2026-07-02T07:05', zone)).toBe('2026-07-01T21:05:00.000Z');
});
it('what nobody touched keeps its seconds, and its side of the hour that comes twice', () => {
  const zone = 'Australia/Hobart';
  for (const text of ['2026-12-01T20:05:07.250Z', '2026-04-04T15:30:00.000Z', '2026-04-04T16:30:00.000Z']) {
    const was = Date.parse(text);
    expect(instantOf(fieldText(was, zone), zone, was)).toBe(text);
  }
  expect(instantOf('2026-12-02T07:06', zone, Date.parse('2026-12-01T20:05:07Z'))).toBe(
    '2026-12-01T20:06:00.000Z',
  );
});
it('what cannot be read is nothing', () => {
  expect([instantOf('', 'UTC'), instantOf(null, 'UTC'), instantOf('soon', 'UTC')]).toEqual([
    null,
    null,
    null,
  ]);
});
