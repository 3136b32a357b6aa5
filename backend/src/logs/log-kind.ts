const startsWith = (head: Uint8Array, ...bytes: number[]): boolean =>
  head.length >= bytes.length && bytes.every((byte, at) => head[at] === byte);
const textAt = (head: Uint8Array, at: number, text: string): boolean =>
  Buffer.from(text, 'latin1').every((byte, index) => head[at + index] === byte);

/** What many logs that are none begin with (file signatures as their own specifications give them). */
const signatures: [is: (head: Uint8Array) => boolean, words: string][] = [
  [
    (head) => startsWith(head, 0x1f, 0x8b),
    'This is a gzip file. Unpack it first, then upload what is in it.',
  ],
  [
    (head) => textAt(head, 0, 'PK\u0003\u0004'),
    'This is a zip file. Unpack it first, then upload what is in it.',
  ],
  [
    (head) => textAt(head, 0, '7z\u00bc\u00af'),
    'This is a 7z file. Unpack it first, then upload what is in it.',
  ],
  [isPicture, 'This is a picture, not a log of sentences.'],
  [(head) => textAt(head, 0, '%PDF-'), 'This is a PDF, not a log of sentences.'],
  [isUtf16, 'This text is saved as UTF-16. Save it as plain text (ASCII or UTF-8), then upload it again.'],
];

function isPicture(head: Uint8Array): boolean {
  return (
    startsWith(head, 0x89, 0x50, 0x4e, 0x47) ||
    startsWith(head, 0xff, 0xd8, 0xff) ||
    textAt(head, 0, 'GIF8') ||
    (textAt(head, 0, 'RIFF') && textAt(head, 8, 'WEBP')) ||
    startsWith(head, 0x49, 0x49, 0x2a, 0x00) ||
    textAt(head, 4, 'ftyphei')
  );
}

/** By its byte order mark, or by letters with a NUL between them from the first `$` on. */
function isUtf16(head: Uint8Array): boolean {
  if (startsWith(head, 0xff, 0xfe) || startsWith(head, 0xfe, 0xff)) return true;
  const dollar = head.indexOf(36);
  if (dollar < 0) return false;
  const isLetter = (at: number) => head[at]! >= 65 && head[at]! <= 90;
  const little = [1, 3, 5].every((step) => head[dollar + step] === 0) && isLetter(dollar + 2);
  const big = dollar > 0 && [-1, 1, 3].every((step) => head[dollar + step] === 0) && isLetter(dollar + 2);
  return little || big;
}

/** Bytes of the beginning that are looked at. */
export const HEAD_BYTES = 4096;

/**
 * Says in words why a file cannot be a log of sentences, by its first bytes; null when it may be one. Other protocols before the
 * first sentence are no reason.
 */
export function refusalOfKind(head: Uint8Array): string | null {
  if (head.length === 0) return 'This file is empty.';
  return signatures.find(([is]) => is(head))?.[1] ?? null;
}
