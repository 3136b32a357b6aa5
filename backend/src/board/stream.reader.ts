import type { Response } from 'express';
import type { Audience } from './frame.js';

/** Bytes that may wait in the server for one reader before frames are held back from it. */
const MAX_WAITING_BYTES = 256 * 1024;

/** One open board. Frames go straight to its response; when it reads too slowly they are held back, not queued. */
export class StreamReader {
  /** Place of the newest frame that was written, in the history. */
  place = 0;
  lastWriteAt = 0;
  /** Since when it reads too slowly, ms; null when it keeps up. */
  laggingSince: number | null = null;

  constructor(
    private readonly response: Response,
    readonly audience: Audience,
    readonly sessionId: string,
    readonly userId: number | null,
    readonly endsAt: number,
    onDrained: (reader: StreamReader) => void,
  ) {
    response.on('drain', () => onDrained(this));
  }

  write(text: string | Buffer, now: number): void {
    this.lastWriteAt = now;
    const fits = this.response.write(text);
    if (!fits && this.laggingSince === null && this.response.writableLength > MAX_WAITING_BYTES)
      this.laggingSince = now;
  }

  end(): void {
    this.response.end();
  }

  /** For a reader that does not read: its buffer would only grow. */
  destroy(): void {
    this.response.destroy();
  }
}
