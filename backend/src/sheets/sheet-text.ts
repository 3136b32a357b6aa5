import type { Sheet, SheetPart } from './sheet.js';

/** A sheet as plain text. */
export const sheetText = ({ line, parts }: Sheet): string =>
  [line, ...parts.map(partText)].join('\n\n') + '\n';

function partText(part: SheetPart): string {
  switch (part.kind) {
    case 'lead':
    case 'paragraph':
    case 'caution':
      return part.text;
    case 'heading':
      return `${part.text}\n${'-'.repeat(part.text.length)}`;
    case 'figures':
      return part.lines.map(({ label, value }) => `${label}: ${value}`).join('\n');
    case 'bars':
      return part.bars
        .map(({ label, value, words }) =>
          [`${label}: ${value}`, ...words.map((line) => `  ${line}`)].join('\n'),
        )
        .join('\n');
    case 'table':
      return tableText([part.head, ...part.rows]);
    case 'link':
      return `${part.text}:\n${part.url}`;
  }
}

/** Columns line up where letters are of one width; elsewhere two spaces still part them. */
function tableText(rows: readonly (readonly string[])[]): string {
  const widths = rows[0]!.map((_, column) => Math.max(...rows.map((row) => row[column]!.length)));
  return rows
    .map((row) =>
      row
        .map((cell, column) => (column === 0 ? cell.padEnd(widths[0]!) : cell.padStart(widths[column]!)))
        .join('  '),
    )
    .join('\n');
}
