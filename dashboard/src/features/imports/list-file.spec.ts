import { expect, it } from 'vitest';
import { decodeList } from './list-file';

const text = 'name\tnote\nBrücke\tsüd – 5 €\n';
const utf16 = (littleEndian: boolean) => {
  const view = new DataView(new ArrayBuffer(2 + text.length * 2));
  view.setUint16(0, 0xfeff, littleEndian);
  for (let index = 0; index < text.length; index++)
    view.setUint16(2 + index * 2, text.charCodeAt(index), littleEndian);
  return new Uint8Array(view.buffer);
};

it.each([
  ['UTF-8', new TextEncoder().encode(text)],
  ['UTF-8', new TextEncoder().encode(`\uFEFF${text}`)],
  ['UTF-16', utf16(true)],
  ['UTF-16', utf16(false)],
])('%#: %s', (encoding, bytes) => {
  expect(decodeList(bytes)).toEqual({ text, encoding });
});
it('a plain CSV of old: 0xFC is ü (WHATWG Encoding, index windows-1252)', () => {
  expect(decodeList(Uint8Array.of(0x42, 0x72, 0xfc, 0x63, 0x6b, 0x65))).toEqual({
    text: 'Brücke',
    encoding: 'Windows-1252',
  });
});
