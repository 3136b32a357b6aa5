import { MOST_ROWS } from '@hubtack/contracts/imports/import.js';
import Papa from 'papaparse';

export interface ListRow {
  /** As a spreadsheet counts, the heading is row 1. */
  row: number;
  /** Cells by column; an empty cell is left out. */
  cells: Map<string, string>;
  /** More cells than the heading has columns. */
  isTooLong: boolean;
  /** What stands between the columns of the list. */
  delimiter: string;
}

/** Nothing of the list can be used; the message says why. */
export class ListProblem extends Error {}

/**
 * Reads a list with a heading: RFC 4180, with a comma, semicolon or tab between.
 * @throws ListProblem when the heading is not one of `columns`, a quote stays open, or there are too many rows.
 */
export function readListText(text: string, columns: readonly [string, ...string[]]): ListRow[] {
  if (text.includes('\0'))
    throw new ListProblem('This is not text: save the list as CSV in UTF-8, or as Unicode text.');
  const { data, errors, meta } = Papa.parse<string[]>(text.replace(/^\uFEFF/, ''), {
    delimitersToGuess: [',', ';', '\t'],
  });
  const broken = errors.find(({ type }) => type === 'Quotes');
  if (broken)
    throw new ListProblem(`Row ${(broken.row ?? 0) + 1}: a quote is opened and not closed rightly.`);
  const [head = [], ...lines] = data;
  const heading = readHeading(head, columns);
  const filled = lines
    .map((cells, index) => ({ cells: cells.map((cell) => cell.trim()), row: index + 2 }))
    .filter(({ cells }) => cells.some((cell) => cell !== ''));
  if (filled.length === 0) throw new ListProblem('There is no row under the heading.');
  if (filled.length > MOST_ROWS)
    throw new ListProblem(`A list has at most ${MOST_ROWS} rows, this one has ${filled.length}: split it.`);
  return filled.map(({ cells, row }) => ({
    row,
    cells: new Map(
      heading.map((name, index) => [name, cells[index] ?? ''] as const).filter(([, cell]) => cell !== ''),
    ),
    isTooLong: cells.slice(heading.length).some((cell) => cell !== ''),
    delimiter: meta.delimiter,
  }));
}

function readHeading(head: readonly string[], columns: readonly [string, ...string[]]): string[] {
  const heading = head.map((cell) =>
    cell
      .trim()
      .toLowerCase()
      .replaceAll(/[\s_]+/g, ' '),
  );
  while (heading.at(-1) === '') heading.pop();
  const known = `The columns are: ${columns.join(', ')}.`;
  const strange = heading.find((name) => !columns.includes(name));
  if (strange !== undefined) throw new ListProblem(`There is no column "${strange.slice(0, 60)}". ${known}`);
  const twice = heading.find((name, index) => heading.indexOf(name) !== index);
  if (twice !== undefined) throw new ListProblem(`The column "${twice}" is there twice.`);
  if (!heading.includes(columns[0])) throw new ListProblem(`The column "${columns[0]}" is missing. ${known}`);
  return heading;
}
