import { FrameReader } from '../nmea/frame-reader.js';
import { readSentence, type Sentence } from '../nmea/sentence.js';

export interface ReadText {
  sentences: Sentence[];
  faults: { code: string; line: number; detail: string }[];
  noise: number[];
}

/** Reads text (or bytes) through the frame reader and the sentence reader, in pieces of `size` bytes. */
export function readText(input: string | Uint8Array, size = Number.MAX_SAFE_INTEGER): ReadText {
  const bytes = typeof input === 'string' ? new TextEncoder().encode(input) : input;
  const read: ReadText = { sentences: [], faults: [], noise: [] };
  const reader = new FrameReader();
  const sink = {
    sentence: (from: Uint8Array, start: number, end: number) =>
      read.sentences.push(readSentence(from, start, end)),
    fault: (code: string, detail: string, line: number) => read.faults.push({ code, line, detail }),
    noise: (line: number) => read.noise.push(line),
  };
  for (let at = 0; at < bytes.length; at += size) reader.push(bytes.subarray(at, at + size), sink);
  reader.end(sink);
  return read;
}
