import { expect, it } from 'vitest';
import { importColumns } from '@hubtack/contracts/imports/import.js';
import { ListProblem, readListText } from './list-text.js';

const read = (text: string) =>
  readListText(text, importColumns.sites).map(({ row, cells }) => ({ row, ...Object.fromEntries(cells) }));

it('RFC 4180: quotes, a doubled quote, a comma and a line break inside, CRLF, and a mark of the byte order', () => {
  // RFC 4180, 2.6 and 2.7: fields with line breaks, double quotes and commas are enclosed in double quotes.
  const text =
    '\uFEFFname,latitude,longitude,note\r\n"Quarry, north",47.5,8.25,"says ""keep out""\r\nring first"\r\nBank,,,\r\n';
  expect(read(text)).toEqual([
    {
      row: 2,
      name: 'Quarry, north',
      latitude: '47.5',
      longitude: '8.25',
      note: 'says "keep out"\r\nring first',
    },
    { row: 3, name: 'Bank' },
  ]);
});
it.each([';', '\t'])('%j between, columns in another order, capitals, empty rows passed over', (between) => {
  const text = [`Longitude,NAME`, `8.25,Quarry`, `,`, `9,Bank`].join('\n').replaceAll(',', between);
  expect(read(text)).toEqual([
    { row: 2, longitude: '8.25', name: 'Quarry' },
    { row: 4, longitude: '9', name: 'Bank' },
  ]);
});
it('a list of names alone', () => {
  expect(read('name\nQuarry\nBank')).toEqual([
    { row: 2, name: 'Quarry' },
    { row: 3, name: 'Bank' },
  ]);
});
it.each([
  ['name,lat\nA,1', 'There is no column "lat". The columns are: name, latitude, longitude, note.'],
  ['latitude,note\n1,x', 'The column "name" is missing. The columns are: name, latitude, longitude, note.'],
  ['name,note,note\nA,x,y', 'The column "note" is there twice.'],
  ['name,note\n', 'There is no row under the heading.'],
  ['name,note\nA,"open', 'Row 2: a quote is opened and not closed rightly.'],
  ['n\0a\0m\0e\0', 'This is not text: save the list as CSV in UTF-8, or as Unicode text.'],
  [`name\n${'A\n'.repeat(50_000)}`, 'A list has at most 5000 rows, this one has 50000: split it.'],
])('%#: refuses the whole list and says why', (text, message) => {
  expect(() => read(text)).toThrow(new ListProblem(message));
});
it('tells of cells beyond the heading', () => {
  expect(
    readListText('name,note\nA,b,c\nB,c,', importColumns.sites).map(({ isTooLong }) => isTooLong),
  ).toEqual([true, false]);
});
