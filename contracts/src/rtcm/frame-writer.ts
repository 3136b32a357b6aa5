import { crc24q } from './crc24q.js';

export const PREAMBLE = 0xd3;
/** Preamble, six reserved bits and ten bits of length. */
export const HEAD_BYTES = 3;
export const CRC_BYTES = 3;
export const MAX_PAYLOAD_BYTES = 1023;

/** A payload as an RTCM 3 frame. @throws RangeError beyond 1023 bytes */
export function frameOf(payload: Uint8Array): Uint8Array {
  if (payload.length > MAX_PAYLOAD_BYTES) throw new RangeError('an RTCM 3 frame holds at most 1023 bytes');
  const frame = new Uint8Array(HEAD_BYTES + payload.length + CRC_BYTES);
  frame[0] = PREAMBLE;
  frame[1] = payload.length >> 8;
  frame[2] = payload.length & 0xff;
  frame.set(payload, HEAD_BYTES);
  const end = HEAD_BYTES + payload.length;
  const crc = crc24q(frame, 0, end);
  frame.set([crc >> 16, (crc >> 8) & 0xff, crc & 0xff], end);
  return frame;
}
