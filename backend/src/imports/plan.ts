import type { ImportRow } from '@hubtack/contracts/imports/import.js';
import type { z } from 'zod';
import { CellProblem } from './cells.js';
import type { ListRow } from './list-text.js';

/** What a list of one kind is made of. */
export interface ListShape<Body extends { name: string }> {
  schema: z.ZodType<Body>;
  /** What a new entry has where the list says nothing; a required value may be missing. */
  blank: Partial<Body>;
  /** Reads the cells of a row into fields, asking for each by its column. */
  read: (
    cell: <T>(column: string, reader: (text: string, delimiter: string) => T) => T | undefined,
  ) => Partial<Body>;
  /** The column that a field of the schema is written in. */
  columnOf: (field: string) => string;
  /** A field in words, for before and after. */
  words: (field: string, value: unknown) => string;
}

export type Existing<Body> = Body & { id: number };

export interface PlannedRow<Body> extends ImportRow {
  /** What will be written; null when nothing is. */
  write: { id: number | null; body: Body } | null;
}

const key = (name: string) => name.toLowerCase();

/**
 * What each row of a list would do to what is there. A row is about the entry of its name, capitals or not; an
 * empty cell leaves what is there. Changes nothing.
 */
export function planImport<Body extends { name: string }>(
  shape: ListShape<Body>,
  rows: readonly ListRow[],
  existing: readonly Existing<Body>[],
): PlannedRow<Body>[] {
  const byName = new Map(existing.map((entry) => [key(entry.name), entry]));
  const seen = new Map<string, number>();
  return rows.map(({ row, cells, isTooLong, delimiter }) => {
    const errors: ImportRow['errors'] = [];
    const wrong = (column: string, detail: string) => errors.push({ column, detail });
    const name = cells.get('name') ?? '';
    if (isTooLong) wrong('name', 'This row has more cells than the heading has columns');
    const earlier = seen.get(key(name));
    if (name !== '' && earlier !== undefined) wrong('name', `Row ${earlier} is about this name already`);
    if (earlier === undefined) seen.set(key(name), row);

    const fields = shape.read((column, reader) => {
      const text = cells.get(column);
      if (text === undefined) return undefined;
      try {
        return reader(text, delimiter);
      } catch (error) {
        if (!(error instanceof CellProblem)) throw error;
        wrong(column, error.message);
        return undefined;
      }
    });
    const known = byName.get(key(name));
    const given = Object.fromEntries(Object.entries(fields).filter(([, value]) => value !== undefined));
    const result = shape.schema.safeParse({ ...shape.blank, ...known, ...given, name });
    for (const issue of result.error?.issues ?? []) {
      const column = shape.columnOf(String(issue.path[0]));
      const isEmpty = !cells.has(column) && issue.code === 'invalid_type';
      if (!errors.some((error) => error.column === column))
        wrong(column, isEmpty ? 'This cannot be empty' : issue.message);
    }
    if (errors.length > 0 || !result.success)
      return { row, name, action: 'wrong', changes: [], errors, write: null };
    const body = result.data;
    if (!known) return { row, name, action: 'add', changes: [], errors, write: { id: null, body } };
    const changes = differences(shape, known, body);
    const action = changes.length > 0 ? 'change' : 'same';
    return { row, name, action, changes, errors, write: action === 'change' ? { id: known.id, body } : null };
  });
}

function differences<Body extends { name: string }>(
  shape: ListShape<Body>,
  before: Existing<Body>,
  after: Body,
): ImportRow['changes'] {
  return Object.entries(after)
    .map(([field, value]) => ({
      column: shape.columnOf(field),
      before: shape.words(field, before[field as keyof Body]),
      after: shape.words(field, value),
    }))
    .filter((change) => change.before !== change.after);
}
