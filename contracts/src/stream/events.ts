import { z } from 'zod';
import { id, instantMs } from '../common.js';
import { lane, laneChange } from '../board/lane.js';

/** `lanes`: what changed since the cursor before. Whole lanes replace, changes merge, gone lanes leave. */
export const lanesEvent = z.object({
  serverTime: instantMs,
  changes: z.array(laneChange),
  lanes: z.array(lane),
  gone: z.array(id),
});
export type LanesEvent = z.infer<typeof lanesEvent>;

/** `beat`: sent after silence, so that page code can tell a quiet board from a dead stream. */
export const beatEvent = z.object({ serverTime: instantMs });
export type BeatEvent = z.infer<typeof beatEvent>;

/** `reset`: the cursor is unknown or too old; fetch the snapshot again. */
export const resetEvent = z.object({ cursor: z.string() });
export type ResetEvent = z.infer<typeof resetEvent>;

export const streamEventNames = ['lanes', 'beat', 'reset'] as const;
export type StreamEventName = (typeof streamEventNames)[number];
