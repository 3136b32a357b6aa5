import { setTimeout as delay } from 'node:timers/promises';
import { LineSplitter } from './line-splitter.js';
import { LogClock, sentencesIn } from './line-time.js';
import { PostBuilder, type Post } from './post-builder.js';
import type { Source } from './sources.js';

/** A live sentence is on its way within this time. */
const LIVE_POST_MS = 400;
/** Pauses in a log are kept up to this long, so that a replay of a day with a night in it ends. */
const LONGEST_PAUSE_MS = 600_000;

const LONG_GAP_MS = 3_600_000;

export interface ReplayOptions {
  source: Source;
  /** Days since 1970 of the first sentence of a stored log; null when only its own sentences or the clock say. */
  firstDay: number | null;
  /** Somebody says so: it stands against the log's own dates. */
  isStated?: boolean;
  /** Log time over wall time; Infinity sends as fast as it is taken. */
  speed: number;
  keep: (post: Post) => void | Promise<void>;
  /** Ends the waiting between instants; what was read is still handed on. */
  stop?: AbortSignal;
}

/** Reads a source to its end and hands on posts, with the log's own timing when its speed asks for it. Throws what `keep` throws. */
export async function replay(options: ReplayOptions): Promise<void> {
  const { source, speed, keep, stop } = options;
  const splitter = new LineSplitter();
  const clock = new LogClock(options.firstDay, options.isStated);
  const builder = new PostBuilder();
  const keepsTime = !source.live && Number.isFinite(speed);
  let timer: NodeJS.Timeout | null = null;
  let writing: Promise<void> = Promise.resolve();
  let failure: unknown = null;
  const handOn = (post: Post | null) => {
    if (!post) return;
    writing = writing
      .then(() => (failure === null ? keep(post) : undefined))
      .catch((error: unknown) => {
        failure ??= error;
      });
  };
  const flush = () => {
    if (timer) clearTimeout(timer);
    timer = null;
    handOn(builder.take());
  };
  const written = async () => {
    await writing;
    if (failure !== null) throw failure;
  };
  let previous: number | null = null;
  let dueAt = performance.now();
  const takeLine = async (line: Uint8Array) => {
    const sentences = sentencesIn(line);
    clock.take(sentences, source.live ? Date.now() : null);
    const isStep = previous !== null && clock.now !== null && !clock.redated;
    const step = isStep ? clock.now! - previous! : 0;
    previous = clock.now ?? previous;
    // A post states one date and its sentences go on from it, so it never spans a long gap.
    if (step > LONG_GAP_MS) flush();
    if (keepsTime && step > 0) {
      flush();
      // Against the time it should be, not from the last one on: a day's replay does not fall behind.
      dueAt += Math.min(step, LONGEST_PAUSE_MS) / speed;
      const wait = dueAt - performance.now();
      if (wait > 0) await delay(wait, undefined, stop ? { signal: stop } : {}).catch(() => undefined);
    }
    handOn(builder.add(line, sentences, clock.now));
    if (source.live && timer === null) timer = setTimeout(flush, LIVE_POST_MS);
    if (failure !== null) await written();
  };
  const takeLines = async (lines: Uint8Array[]) => {
    for (const line of lines) {
      if (stop?.aborted && !source.live) return;
      await takeLine(line);
    }
  };
  try {
    for await (const chunk of source.bytes) {
      await takeLines(splitter.push(chunk));
      if (!source.live) await written();
    }
    await takeLines(splitter.end());
  } finally {
    flush();
    await writing;
  }
  await written();
}
