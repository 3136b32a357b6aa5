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

/**
 * Posts on disk, in order, one file each: first line the date, then the bytes. A post counts as kept once its file has
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
      writeSync(handle, `${post.date ?? NO_DATE}\n`);
      for (let at = 0; at < post.body.length;) at += writeSync(handle, post.body, at);
      fsyncSync(handle);
    } finally {
      closeSync(handle);
    }
    renameSync(unfinished, file);
    this.syncFolder();
    this.waiting.add(this.next++);
  }

  /** The oldest post, with its number; null when nothing waits. */
  oldest(): { number: number; post: Post } | null {
    // A set keeps the order of adding, which is the order of numbers.
    const [number] = this.waiting;
    if (number === undefined) return null;
    const content = readFileSync(join(this.folder, this.nameOf(number)));
    const end = content.indexOf(10);
    const date = content.subarray(0, end).toString('latin1');
    return { number, post: { date: date === NO_DATE ? null : date, body: content.subarray(end + 1) } };
  }

  /** The server has answered for it. */
  done(number: number): void {
    rmSync(join(this.folder, this.nameOf(number)));
    this.waiting.delete(number);
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
