const LF = 10;
const DOLLAR = 36;
/** A stretch without any line end (another protocol, or lines that end in CR alone) is cut here, so that memory stays bounded. */
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
    let dollar = 0;
    for (let at = 0; at < bytes.length; at++) {
      if (bytes[at] === DOLLAR) dollar = at;
      const isEnd = bytes[at] === LF;
      if (!isEnd && at - from < LONGEST) continue;
      // A sentence may be on its way: the cut goes before it, never through it.
      const end = !isEnd && dollar > from ? dollar : at + 1;
      lines.push(bytes.slice(from, end));
      from = end;
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
