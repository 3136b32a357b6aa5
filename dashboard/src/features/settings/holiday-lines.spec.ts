import { expect, it } from 'vitest';
import { readHolidayLines, withDays } from './holiday-lines';

it('lines with a comma; a heading and empty lines are passed over', () => {
  const text =
    '\uFEFFdate,name\r\n2026-12-25,Christmas Day\r\n\r\n2026-12-28,"Boxing Day, observed"\r\n2027-01-01, New Year';
  expect(readHolidayLines(text)).toEqual({
    days: [
      { day: '2026-12-25', name: 'Christmas Day' },
      { day: '2026-12-28', name: 'Boxing Day, observed' },
      { day: '2027-01-01', name: 'New Year' },
    ],
    errors: [],
  });
});
it.each([';', '\t'])('%j between them', (between) => {
  expect(readHolidayLines(`2026-12-25${between}Christmas Day`).days).toEqual([
    { day: '2026-12-25', name: 'Christmas Day' },
  ]);
});
it('says which line is wrong, and keeps the others', () => {
  expect(
    readHolidayLines('25.12.2026, Christmas\n2026-02-30, never\n2026-12-26, Boxing Day\n2026-12-27'),
  ).toEqual({
    days: [{ day: '2026-12-26', name: 'Boxing Day' }],
    errors: [
      { line: 1, detail: 'Write a date such as 2026-12-25' },
      { line: 2, detail: 'Write a date such as 2026-12-25' },
      { line: 4, detail: 'Write the name of the day' },
    ],
  });
});
it('a day that is there already takes the new name, in order', () => {
  const list = [{ day: '2026-12-25', name: 'a' }];
  expect(
    withDays(list, [
      { day: '2026-01-01', name: 'b' },
      { day: '2026-12-25', name: 'c' },
    ]),
  ).toEqual([
    { day: '2026-01-01', name: 'b' },
    { day: '2026-12-25', name: 'c' },
  ]);
});
