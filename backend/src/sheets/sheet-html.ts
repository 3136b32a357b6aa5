import type { FixState } from '@hubtack/contracts/fixes/fix-state.js';
import type { Bar, Segment, Sheet, SheetPart } from './sheet.js';

/** Light grounds and state colours of the design; mail programs know no style sheet, so each element carries its own. */
const INK = '#1B232A';
const SOFT = '#56606A';
const RULE = '#DEDACF';
const PAPER = '#F7F5EF';
const RAISED = '#FFFDF7';
const WARN = '#FFF3DA';
const LINK = '#1D5FA8';
const stateColours: Record<FixState, string> = {
  fixed: '#1D5FA8',
  float: '#BD7900',
  code: '#9C3A6B',
  none: '#4A4A4A',
  silent: '#646D75',
};
const FONT = "font-family:'Work Sans',Arial,Helvetica,sans-serif";
const NUMBERS = 'font-variant-numeric:tabular-nums';
/** A state that there was stays visible. */
const NARROWEST = 0.005;

const escapes: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};
const escape = (text: string): string => text.replaceAll(/[&<>"']/g, (sign) => escapes[sign]!);

const layout = (attributes: string, rows: string): string =>
  `<table role="presentation" cellpadding="0" cellspacing="0" border="0" ${attributes}>${rows}</table>`;
const paragraph = (style: string, text: string): string =>
  `<p style="margin:0 0 12px;${FONT};${style}">${escape(text)}</p>`;

/** A sheet as HTML that mail programs leave alone: tables, inline styles, nothing to load, nothing to run. */
export function sheetHtml({ subject, line, parts }: Sheet): string {
  const inner = `${paragraph(`font-size:13px;color:${SOFT}`, line)}${parts.map(partHtml).join('\n')}`;
  const page = layout(
    `width="640" style="width:100%;max-width:640px;table-layout:fixed;background:${RAISED};border:1px solid ${RULE}"`,
    `<tr><td align="left" style="padding:24px;word-wrap:break-word">${inner}</td></tr>`,
  );
  return [
    '<!doctype html>',
    '<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width">',
    `<meta name="color-scheme" content="light"><title>${escape(subject)}</title></head>`,
    `<body style="margin:0;padding:0;background:${PAPER};color:${INK}">`,
    layout(
      `width="100%" bgcolor="${PAPER}" style="table-layout:fixed"`,
      `<tr><td align="center" style="padding:16px 8px">${page}</td></tr>`,
    ),
    '</body></html>',
  ].join('\n');
}

function partHtml(part: SheetPart): string {
  switch (part.kind) {
    case 'lead':
      return paragraph('font-size:20px;line-height:28px;font-weight:600', part.text);
    case 'paragraph':
      return paragraph('font-size:14px;line-height:21px', part.text);
    case 'heading':
      return `<h2 style="margin:24px 0 8px;${FONT};font-size:16px;line-height:22px">${escape(part.text)}</h2>`;
    case 'caution':
      return layout(
        'width="100%" style="margin:12px 0"',
        `<tr><td bgcolor="${WARN}" style="padding:10px 12px;border-left:4px solid ${stateColours.float};${FONT};font-size:14px;line-height:21px">${escape(part.text)}</td></tr>`,
      );
    case 'figures':
      return layout(
        'width="100%" style="border-collapse:collapse"',
        part.lines.map(({ label, value }) => figureRow(label, value)).join(''),
      );
    case 'bars':
      return part.bars.map(barHtml).join('');
    case 'table':
      return tableHtml(part.head, part.rows);
    case 'link':
      return `<p style="margin:16px 0;${FONT};font-size:15px"><a href="${escape(part.url)}" style="color:${LINK};font-weight:600">${escape(part.text)}</a></p>`;
  }
}

function figureRow(label: string, value: string): string {
  const cell = `padding:5px 0;border-bottom:1px solid ${RULE};${FONT};font-size:14px;line-height:20px`;
  return `<tr><td valign="top" width="42%" style="${cell};color:${SOFT};padding-right:12px">${escape(label)}</td><td valign="top" style="${cell};${NUMBERS}">${escape(value)}</td></tr>`;
}

function barHtml({ label, value, segments, words }: Bar): string {
  const head = `<tr><td style="${FONT};font-size:14px;line-height:20px;font-weight:600">${escape(label)}</td><td align="right" style="${FONT};font-size:14px;font-weight:600;${NUMBERS};white-space:nowrap;padding-left:12px">${escape(value)}</td></tr>`;
  const said = words
    .map(
      (line) =>
        `<div style="${FONT};font-size:12px;line-height:17px;color:${SOFT};${NUMBERS}">${escape(line)}</div>`,
    )
    .join('');
  return (
    layout('width="100%"', head) + segmentsHtml(segments) + `<div style="padding:3px 0 12px">${said}</div>`
  );
}

function segmentsHtml(segments: readonly Segment[]): string {
  const shown = segments.filter(({ share }) => share > 0);
  if (shown.length === 0) return '';
  const cells = shown.map(({ state, share }) =>
    segmentCell(state === null ? INK : stateColours[state], Math.max(share, NARROWEST)),
  );
  const rest = 1 - shown.reduce((sum, { share }) => sum + share, 0);
  if (rest > NARROWEST) cells.push(segmentCell(RULE, rest));
  return layout(
    `width="100%" style="table-layout:fixed;border-collapse:collapse"`,
    `<tr>${cells.join('')}</tr>`,
  );
}

function segmentCell(colour: string, share: number): string {
  const width = `${(share * 100).toFixed(1)}%`;
  return `<td width="${width}" height="14" bgcolor="${colour}" style="width:${width};height:14px;background:${colour};border-right:1px solid ${RAISED};font-size:1px;line-height:14px">&nbsp;</td>`;
}

function tableHtml(head: readonly string[], rows: readonly (readonly string[])[]): string {
  const cell = (tag: string, text: string, column: number, style: string) =>
    `<${tag} align="${column === 0 ? 'left' : 'right'}" valign="bottom" style="padding:4px 0 4px ${column === 0 ? 0 : 8}px;${FONT};font-size:12px;line-height:16px;${NUMBERS};${style}">${escape(text)}</${tag.split(' ')[0]!}>`;
  const names = head.map((name, column) =>
    cell('th scope="col"', name, column, `color:${SOFT};font-weight:400;border-bottom:1px solid ${INK}`),
  );
  const lines = rows.map((row, index) => {
    const isSum = index === rows.length - 1;
    const style = isSum
      ? `font-weight:600;border-top:1px solid ${INK}`
      : `font-weight:400;border-bottom:1px solid ${RULE}`;
    const cells = row.map((text, column) =>
      cell(column === 0 ? 'th scope="row"' : 'td', text, column, style),
    );
    return `<tr>${cells.join('')}</tr>`;
  });
  return `<div style="overflow-x:auto;padding-bottom:16px"><table cellpadding="0" cellspacing="0" border="0" width="100%" style="border-collapse:collapse"><tr>${names.join('')}</tr>${lines.join('')}</table></div>`;
}
