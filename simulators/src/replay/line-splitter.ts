const LF = 10;
/** A stretch without any line end (another protocol) is cut here, so that memory stays bounded. */
const LONGEST = 4096;

/** Cuts bytes at line ends, whatever the chunks. Bytes pass through unchanged: they may be of other protocols. */
export class LineSplitter {
  private rest = new Uint8Array(0);

  push(chunk: Uint8Array): Uint8Array[] {
    const bytes = new Uint8Array(this.rest.length + chunk.length);
    bytes.set(this.rest);
    bytes.set(chunk, this.rest.length);
    const lines: Uint8Array[] = [];
    let from = 0;
    for (let at = 0; at < bytes.length; at++) {
      if (bytes[at] !== LF && at - from < LONGEST) continue;
      lines.push(bytes.slice(from, at + 1));
      from = at + 1;
    }
    this.rest = bytes.slice(from);
    return lines;
  }

  end(): Uint8Array[] {
    const { rest } = this;
    this.rest = new Uint8Array(0);
    return rest.length > 0 ? [rest] : [];
  }
}
