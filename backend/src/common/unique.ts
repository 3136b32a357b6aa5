import { conflict } from './problem.exception.js';

/** Runs a write; a broken uniqueness becomes a conflict that points at the field. */
export function uniquely<T>(pointer: string, detail: string, write: () => T): T {
  try {
    return write();
  } catch (error) {
    const code =
      (error as { code?: unknown; cause?: { code?: unknown } }).code ??
      (error as { cause?: { code?: unknown } }).cause?.code;
    if (code === 'SQLITE_CONSTRAINT_UNIQUE') throw conflict(detail, [{ pointer, detail }]);
    throw error;
  }
}
