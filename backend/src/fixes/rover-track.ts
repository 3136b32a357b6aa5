import type { Epoch } from './epoch.js';
import type { Tail } from './timeline.js';

/** How far the stored row of a growing run may lag behind its epochs: one write a minute instead of one a second. */
export const CHECKPOINT_MS = 60_000;

/** What is remembered of a rover between epochs. Never changed in place, so that a failed commit can be undone. */
export interface RoverTrack {
  tail: Tail | null;
  /** `tail.lastTime` as its stored row has it. */
  storedLastTime: number;
  /** The newest epoch by time. */
  latest: Epoch | null;
}

export const emptyTrack: RoverTrack = { tail: null, storedLastTime: 0, latest: null };
