import Papa from 'papaparse';
import { expect, it } from 'vitest';
import { csvOf, type CsvCell } from './csv.js';

const cellsOf = (csv: string): string[][] => Papa.parse<string[]>(csv.slice(1)).data;
const one = (cell: CsvCell): string => cellsOf(csvOf(['head'], [[cell]]))[1]![0]!;

it('begins with the byte order mark, ends its lines with CRLF, quotes what needs it', () => {
  const csv = csvOf(['Crew', 'Fixed (h)'], [['Alder, "north"', { value: 6.25, decimals: 4 }]]);
  expect(csv).toBe('\uFEFFCrew,Fixed (h)\r\n"Alder, ""north""",6.2500');
});

it.each([
  ['=1+1', "'=1+1"],
  ['+61 491', "'+61 491"],
  ['-2', "'-2"],
  ['@SUM(A1)', "'@SUM(A1)"],
  ['\t=1', "'\t=1"],
  ['\r=1', "'\r=1"],
  ['=1\n+2', "'=1\n+2"],
  ['\uFF1D1', "'\uFF1D1"],
  ['=HYPERLINK("http://pennywort.example","x")', '\'=HYPERLINK("http://pennywort.example","x")'],
])('text %j is made harmless', (text, harmless) => {
  expect(one(text)).toBe(harmless);
});

it.each(['Alder', 'R-01', 'a=b', '', "O'Brien", 'Two\r\nlines', 'say "hub"', 'a,b;c'])(
  'text %j comes back as it is',
  (text) => {
    expect(one(text)).toBe(text);
  },
);

it('numbers stay numbers, negative ones too', () => {
  expect(csvOf([], [[-5, { value: -0.25, decimals: 4 }, 0, null]])).toBe('\uFEFF\r\n-5,-0.2500,0,');
});

it('a formula in a column’s name is made harmless as well', () => {
  expect(cellsOf(csvOf(['=x'], []))[0]).toEqual(["'=x"]);
});
