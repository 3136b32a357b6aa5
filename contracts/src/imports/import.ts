import { z } from 'zod';

export const importKind = z.enum(['crews', 'sites', 'control-points']);
export type ImportKind = z.infer<typeof importKind>;

/** The most rows of one list, the heading not counted. */
export const MOST_ROWS = 5000;
/** The most characters of one list; a request may have 1 MB. */
export const MOST_CHARACTERS = 800_000;

/** The columns of each list, in the order of its example. The first is required and says which entry a row is about. */
export const importColumns = {
  crews: ['name', 'phone', 'site', 'hourly rate', 'days', 'start', 'end'],
  sites: ['name', 'latitude', 'longitude', 'note'],
  'control-points': ['name', 'latitude', 'longitude', 'height', 'height kind', 'datum', 'note'],
} as const satisfies Record<ImportKind, readonly [string, ...string[]]>;

const text = z.string().min(1, 'The list is empty').max(MOST_CHARACTERS, 'The list is too long: split it');
/** A list as comma-separated values (RFC 4180); semicolons or tabs may stand between as well. */
export const previewImportBody = z.object({ text });
export type PreviewImportBody = z.infer<typeof previewImportBody>;

export const importRow = z.object({
  /** As a spreadsheet counts: the heading is row 1. */
  row: z.number().int(),
  name: z.string(),
  action: z.enum(['add', 'change', 'same', 'wrong']),
  /** What a changed entry had and will have, in words. */
  changes: z.array(z.object({ column: z.string(), before: z.string(), after: z.string() })),
  errors: z.array(z.object({ column: z.string(), detail: z.string() })),
});
export type ImportRow = z.infer<typeof importRow>;
export const importPreview = z.object({
  rows: z.array(importRow),
  /** Stands for exactly these rows on exactly what is there now. */
  fingerprint: z.string(),
});
export type ImportPreview = z.infer<typeof importPreview>;

/** The same text again, and the fingerprint of the preview that somebody agreed to. */
export const importBody = previewImportBody.extend({ fingerprint: z.string() });
export type ImportBody = z.infer<typeof importBody>;
export const importDone = z.object({ added: z.number().int(), changed: z.number().int() });
export type ImportDone = z.infer<typeof importDone>;
