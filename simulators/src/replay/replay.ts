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
}

/** Reads a source to its end and hands on posts, with the log's own timing when its speed asks for it. */
export async function replay(options: ReplayOptions): Promise<void> {
  const { source, speed, keep } = options;
  const splitter = new LineSplitter();
  const clock = new LogClock(options.firstDay, options.isStated);
  const builder = new PostBuilder();
  const keepsTime = !source.live && Number.isFinite(speed);
  let timer: NodeJS.Timeout | null = null;
  let writing: Promise<void> = Promise.resolve();
  const handOn = (post: Post | null) => {
    if (post) writing = writing.then(() => keep(post));
  };
  const flush = () => {
    if (timer) clearTimeout(timer);
    timer = null;
    handOn(builder.take());
  };
  let previous: number | null = null;
  const takeLine = async (line: Uint8Array) => {
    const sentences = sentencesIn(line);
    clock.take(sentences, source.live ? Date.now() : null);
    const step = previous === null || clock.now === null ? 0 : clock.now - previous;
    previous = clock.now ?? previous;
    // A post states one date and its sentences go on from it, so it never spans a long gap.
    if (step > LONG_GAP_MS && !clock.redated) flush();
    if (keepsTime && step > 0) {
      flush();
      await delay(Math.min(step, LONGEST_PAUSE_MS) / speed);
    }
    handOn(builder.add(line, sentences, clock.now));
    if (source.live && timer === null) timer = setTimeout(flush, LIVE_POST_MS);
  };
  for await (const chunk of source.bytes) {
    for (const line of splitter.push(chunk)) await takeLine(line);
    if (!source.live) await writing;
  }
  for (const line of splitter.end()) await takeLine(line);
  flush();
  await writing;
}
