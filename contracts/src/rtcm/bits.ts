/** Numbers of RTCM data fields: most significant bit first. Plain arithmetic, because shifts end at 32 bits and DF025 has 38. */

/** Unsigned number of `length` bits (at most 52) from bit `from` on. */
export function unsignedAt(bytes: Uint8Array, from: number, length: number): number {
  let value = 0;
  for (let at = from; at < from + length; at++) value = value * 2 + ((bytes[at >> 3]! >> (7 - (at & 7))) & 1);
  return value;
}

/** The same as a two's complement number. */
export function signedAt(bytes: Uint8Array, from: number, length: number): number {
  const value = unsignedAt(bytes, from, length);
  return value >= 2 ** (length - 1) ? value - 2 ** length : value;
}

/** Writes the lowest `length` bits of a whole number, negative ones as two's complement. */
export function writeBits(bytes: Uint8Array, from: number, length: number, value: number): void {
  let rest = value < 0 ? value + 2 ** length : value;
  for (let at = from + length - 1; at >= from; at--) {
    const mask = 1 << (7 - (at & 7));
    if (rest % 2 === 1) bytes[at >> 3]! |= mask;
    else bytes[at >> 3]! &= ~mask;
    rest = Math.floor(rest / 2);
  }
}
