import { expect, it } from 'vitest';
import { localDate } from './local-date';

it.each([
  ['2026-12-01T12:59:59Z', 'Australia/Hobart', '2026-12-01'],
  ['2026-12-01T13:00:00Z', 'Australia/Hobart', '2026-12-02'],
  ['2026-12-01T06:59:00Z', 'America/Denver', '2026-11-30'],
])('%s in %s is %s', (at, zone, date) => {
  expect(localDate(Date.parse(at), zone)).toBe(date);
});
