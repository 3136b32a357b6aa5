import Papa from 'papaparse';

/** A number with a fixed count of decimals. */
export interface Decimal {
  value: number;
  decimals: number;
}
/** Null: nothing is known; the cell stays empty. */
export type CsvCell = string | number | Decimal | null;

/** Spreadsheets put this away and read UTF-8; without it some read their own code page. */
const BYTE_ORDER_MARK = '\uFEFF';
/** What makes a spreadsheet take a cell for a formula; line feed and the full-width signs do so in some. */
const FORMULA_STARTS = /^[=+\-@\t\r\n\uFF1D\uFF0B\uFF0D\uFF20]/;

/**
 * A table by RFC 4180, UTF-8 with a byte order mark. Text that a spreadsheet would run as a formula gets a leading apostrophe; numbers stay
 * numbers, negative ones too. (papaparse's own `escapeFormulae` passes over a formula with a line break in it.)
 */
export function csvOf(head: readonly string[], rows: readonly (readonly CsvCell[])[]): string {
  const lines = [head, ...rows].map((row) => row.map(written));
  return BYTE_ORDER_MARK + Papa.unparse(lines, { newline: '\r\n' });
}

function written(cell: CsvCell): string | number | null {
  if (typeof cell === 'string') return FORMULA_STARTS.test(cell) ? `'${cell}` : cell;
  if (cell === null || typeof cell === 'number') return cell;
  return cell.value.toFixed(cell.decimals);
}
