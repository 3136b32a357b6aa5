/**
 * The text of a file as spreadsheets save it: UTF-8, UTF-16 with its mark of the byte order (which "Unicode text"
 * has), or else Windows-1252, which a plain "CSV" often is.
 */
export function decodeList(bytes: Uint8Array): { text: string; encoding: string } {
  const [first, second] = bytes;
  const marked =
    first === 0xff && second === 0xfe ? 'utf-16le' : first === 0xfe && second === 0xff ? 'utf-16be' : null;
  if (marked) return { text: new TextDecoder(marked).decode(bytes), encoding: 'UTF-16' };
  try {
    return { text: new TextDecoder('utf-8', { fatal: true }).decode(bytes), encoding: 'UTF-8' };
  } catch {
    return { text: new TextDecoder('windows-1252').decode(bytes), encoding: 'Windows-1252' };
  }
}
