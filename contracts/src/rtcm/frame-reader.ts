import { unsignedAt } from './bits.js';
import { crc24q } from './crc24q.js';
import { CRC_BYTES, HEAD_BYTES, PREAMBLE } from './frame-writer.js';

export interface FrameHandlers {
  /** A frame whose CRC is right. The payload is only valid during the call. */
  frame: (payload: Uint8Array, messageNumber: number) => void;
  /** What looked like a frame and whose CRC is wrong. */
  badCrc?: () => void;
  /** Bytes that belong to no frame. */
  noise?: (bytes: number) => void;
}

/** Message numbers have twelve bits. */
const LEAST_PAYLOAD_BYTES = 2;

/**
 * Finds RTCM 3 frames in a stream of bytes, however it is cut. 0xD3 stands inside payloads too, so only a right CRC makes a
 * frame: after a wrong one it goes on at the next byte, not after the frame. Holds at most one frame of bytes.
 */
export class RtcmFrameReader {
  private held: Uint8Array = new Uint8Array(0);

  constructor(private readonly handlers: FrameHandlers) {}

  push(chunk: Uint8Array): void {
    let bytes = chunk;
    if (this.held.length > 0) {
      bytes = new Uint8Array(this.held.length + chunk.length);
      bytes.set(this.held);
      bytes.set(chunk, this.held.length);
    }
    const read = this.scan(bytes, false);
    // A copy: the chunk may be used again by whoever gave it.
    this.held = bytes.slice(read);
  }

  /** No more bytes come: what is held may still hide a short frame behind a preamble that was none. */
  end(): void {
    this.scan(this.held, true);
    this.held = new Uint8Array(0);
  }

  /** Answers how far it has read; without `isLast` it waits at a frame that is not whole yet. */
  private scan(bytes: Uint8Array, isLast: boolean): number {
    let noise = 0;
    let at = 0;
    while (at < bytes.length) {
      const size = this.sizeAt(bytes, at);
      if (size === 'unknown' || (size !== null && at + size > bytes.length)) {
        if (!isLast) break;
      } else if (size !== null) {
        const end = at + size;
        if (crc24q(bytes, at, end) === 0) {
          if (noise > 0) this.handlers.noise?.(noise);
          noise = 0;
          this.hand(bytes.subarray(at + HEAD_BYTES, end - CRC_BYTES));
          at = end;
          continue;
        }
        this.handlers.badCrc?.();
      }
      noise++;
      at++;
    }
    if (noise > 0) this.handlers.noise?.(noise);
    return at;
  }

  /** Size of the frame that may begin here; null when none can, 'unknown' when its head is not whole yet. */
  private sizeAt(bytes: Uint8Array, at: number): number | 'unknown' | null {
    if (bytes[at] !== PREAMBLE) return null;
    if (at + 1 >= bytes.length) return 'unknown';
    // The six reserved bits are 0; the ten of the length follow, so that no frame is longer than 1029 bytes.
    if (bytes[at + 1]! > 3) return null;
    if (at + 2 >= bytes.length) return 'unknown';
    return HEAD_BYTES + ((bytes[at + 1]! << 8) | bytes[at + 2]!) + CRC_BYTES;
  }

  private hand(payload: Uint8Array): void {
    // An empty frame is a filler: it has no message number.
    if (payload.length >= LEAST_PAYLOAD_BYTES) this.handlers.frame(payload, unsignedAt(payload, 0, 12));
  }
}
