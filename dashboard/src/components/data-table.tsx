import type { ReactNode } from 'react';
import './data-table.css';

interface Column<Row> {
  name: string;
  cell: (row: Row) => ReactNode;
  /** Figures stand right. */
  figure?: boolean;
}

interface DataTableProps<Row> {
  label: string;
  rows: readonly Row[];
  rowKey: (row: Row) => number | string;
  columns: readonly Column<Row>[];
  isFaded?: (row: Row) => boolean;
}

/** A plain table: figures in columns, thin rules; on a phone each row becomes a card with its columns named. */
export function DataTable<Row>({ label, rows, rowKey, columns, isFaded }: DataTableProps<Row>) {
  return (
    <table className="data-table" aria-label={label}>
      <thead>
        <tr>
          {columns.map(({ name, figure }) => (
            <th key={name} scope="col" data-figure={figure}>
              {name}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <tr key={rowKey(row)} data-faded={isFaded?.(row)}>
            {columns.map(({ name, cell, figure }) => (
              <td key={name} data-name={name} data-figure={figure}>
                {cell(row)}
              </td>
            ))}
          </tr>
        ))}
      </tbody>
    </table>
  );
}
