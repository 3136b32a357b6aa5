const LF = 10;
/** A size line is a few hexadecimal figures, and perhaps an extension. */
const MAX_LINE_BYTES = 1024;

/** Takes the chunk sizes off a body (RFC 9112, 7.1), however it is cut. A size that is none ends the body. */
export class ChunkedDecoder {
  private left = 0;
  private line = '';
  private state: 'size' | 'data' | 'afterData' | 'trailer' | 'over' = 'size';

  constructor(
    private readonly body: (bytes: Uint8Array) => void,
    private readonly done: () => void,
  ) {}

  push(bytes: Uint8Array): void {
    let at = 0;
    while (at < bytes.length && this.state !== 'over') {
      if (this.state === 'data') {
        const part = bytes.subarray(at, at + this.left);
        at += part.length;
        this.left -= part.length;
        this.body(part);
        if (this.left === 0) this.state = 'afterData';
        continue;
      }
      const byte = bytes[at++]!;
      if (byte !== LF) {
        this.line += String.fromCharCode(byte);
        if (this.line.length > MAX_LINE_BYTES) this.finish();
        continue;
      }
      const line = this.line.replace(/\r$/, '');
      this.line = '';
      this.readLine(line);
    }
  }

  private readLine(line: string): void {
    if (this.state === 'afterData') this.state = 'size';
    else if (this.state === 'trailer') {
      if (line === '') this.finish();
    } else {
      const size = /^ *([0-9a-fA-F]{1,7}) *(;.*)?$/.exec(line)?.[1];
      if (size === undefined) return this.finish();
      this.left = Number.parseInt(size, 16);
      this.state = this.left === 0 ? 'trailer' : 'data';
    }
  }

  private finish(): void {
    this.state = 'over';
    this.done();
  }
}
