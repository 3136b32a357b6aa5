import { addMoved, nothingMoved, type Moved } from './frame.js';

/** Frames that can be resumed from: ten minutes at four a second. */
const KEPT_FRAMES = 2400;

/** Which lanes moved in each of the newest frames. A resumed board gets the newest state of all that moved since. */
export class StreamHistory {
  private sequence = 0;
  private readonly frames: { sequence: number; moved: Moved; ribbons: ReadonlySet<number> }[] = [];

  /** `life` tells this run of the server from others, whose cursors mean nothing here. */
  constructor(private readonly life: string) {}

  get cursor(): string {
    return `${this.life}.${this.sequence}`;
  }

  get newest(): number {
    return this.sequence;
  }

  add(moved: Moved, ribbons: ReadonlySet<number>): void {
    this.sequence++;
    this.frames.push({ sequence: this.sequence, moved, ribbons });
    if (this.frames.length > KEPT_FRAMES) this.frames.shift();
  }

  /** The place of a cursor; null when it is not ours or too old. */
  placeOf(cursor: string): number | null {
    const match = /^([\w-]{1,40})\.(\d{1,15})$/.exec(cursor);
    if (!match || match[1] !== this.life) return null;
    const place = Number(match[2]);
    const oldest = this.sequence - this.frames.length;
    return place >= oldest && place <= this.sequence ? place : null;
  }

  /** All that moved after a place; null when that is too long ago. */
  since(place: number): { moved: Moved; ribbons: Set<number> } | null {
    if (place < this.sequence - this.frames.length) return null;
    const moved = nothingMoved();
    const ribbons = new Set<number>();
    for (let at = this.frames.length - (this.sequence - place); at < this.frames.length; at++) {
      const frame = this.frames[at]!;
      addMoved(moved, frame.moved);
      for (const id of frame.ribbons) ribbons.add(id);
    }
    return { moved, ribbons };
  }
}
