import {
  closeSync,
  fsyncSync,
  mkdirSync,
  openSync,
  readdirSync,
  readFileSync,
  renameSync,
  rmSync,
  writeSync,
} from 'node:fs';
import { join } from 'node:path';
import type { Post } from './post-builder.js';

const NAME = /^(\d{12})\.post$/;
const NO_DATE = '-';
/** What waited is sent in posts of up to this size: a day without coverage is not a hundred thousand posts. */
const MOST_BYTES = 50_000;
/** Joined posts state the date of the first, and their sentences go on from it: never over a gap that could hide a day. */
const LONGEST_GAP_MS = 3_600_000;

const headOf = ({ date, span }: Post): string =>
  [date ?? NO_DATE, ...(span ? [span.from, span.to] : [])].join(' ');

function postOf(content: Buffer): Post {
  const end = content.indexOf(10);
  const [date = NO_DATE, from, to] = content.subarray(0, end).toString('latin1').split(' ');
  return {
    date: date === NO_DATE ? null : date,
    ...(from && to ? { span: { from: Number(from), to: Number(to) } } : {}),
    body: content.subarray(end + 1),
  };
}

/** Two posts in a row as one; null when they are better sent one by one. */
function joined(first: Post, next: Post): Post | null {
  if (!first.span || !next.span || first.body.length + next.body.length > MOST_BYTES) return null;
  const gapMs = next.span.from - first.span.to;
  if (gapMs < 0 || gapMs > LONGEST_GAP_MS) return null;
  const span = { from: first.span.from, to: next.span.to };
  return { date: first.date, span, body: Buffer.concat([first.body, next.body]) };
}

/**
 * Posts on disk, in order, one file each: first line date and span, then the bytes. A post counts as kept once its file has
 * been synced and renamed into place, and is taken away only after the server has answered for it; so a kill at any
 * point loses nothing, and at worst sends the last post again, which the server counts as duplicates.
 * One process at a time owns a folder (`claimFolder`): the list of what waits is read once.
 */
export class Spool {
  private next: number;
  private readonly waiting: Set<number>;

  constructor(private readonly folder: string) {
    mkdirSync(folder, { recursive: true });
    const numbers = this.numbers();
    this.waiting = new Set(numbers);
    this.next = (numbers.at(-1) ?? 0) + 1;
  }

  /** Posts that wait. */
  get length(): number {
    return this.waiting.size;
  }

  keep(post: Post): void {
    const file = join(this.folder, this.nameOf(this.next));
    const unfinished = `${file}.new`;
    const handle = openSync(unfinished, 'w');
    try {
      writeSync(handle, `${headOf(post)}\n`);
      for (let at = 0; at < post.body.length;) at += writeSync(handle, post.body, at);
      fsyncSync(handle);
    } finally {
      closeSync(handle);
    }
    renameSync(unfinished, file);
    this.syncFolder();
    this.waiting.add(this.next++);
  }

  /** The oldest post, joined with those after it as far as they go together, and the number of the last one in it; null when nothing waits. */
  oldest(): { number: number; post: Post } | null {
    let oldest: { number: number; post: Post } | null = null;
    // A set keeps the order of adding, which is the order of numbers.
    for (const number of this.waiting) {
      const next = postOf(readFileSync(join(this.folder, this.nameOf(number))));
      const post: Post | null = oldest ? joined(oldest.post, next) : next;
      if (!post) break;
      oldest = { number, post };
    }
    return oldest;
  }

  /** The server has answered for all up to this number. */
  done(number: number): void {
    for (const waits of this.waiting) {
      if (waits > number) return;
      rmSync(join(this.folder, this.nameOf(waits)));
      this.waiting.delete(waits);
    }
  }

  private nameOf(number: number): string {
    return `${String(number).padStart(12, '0')}.post`;
  }

  private numbers(): number[] {
    return readdirSync(this.folder)
      .map((name) => NAME.exec(name)?.[1])
      .filter((digits) => digits !== undefined)
      .map(Number)
      .sort((a, b) => a - b);
  }

  private syncFolder(): void {
    const handle = openSync(this.folder, 'r');
    fsyncSync(handle);
    closeSync(handle);
  }
}
