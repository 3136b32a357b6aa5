/**
 * CRC-24Q of RTCM 3 frames (RTCM 10403.x; catalogue name CRC-24/LTE-A): polynomial 0x1864CFB, start 0, not reflected,
 * nothing added at the end. Over a whole frame with its own CRC the result is 0.
 */
const POLYNOMIAL = 0x864cfb;

const TABLE = Uint32Array.from({ length: 256 }, (_, byte) => {
  let crc = byte << 16;
  for (let bit = 0; bit < 8; bit++) crc = crc & 0x800000 ? (crc << 1) ^ POLYNOMIAL : crc << 1;
  return crc & 0xffffff;
});

/** CRC of bytes[start, end). */
export function crc24q(bytes: Uint8Array, start = 0, end = bytes.length): number {
  let crc = 0;
  for (let at = start; at < end; at++) crc = ((crc << 8) ^ TABLE[(crc >>> 16) ^ bytes[at]!]!) & 0xffffff;
  return crc;
}
