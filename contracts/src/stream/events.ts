import { z } from 'zod';
import { id, instantMs } from '../common.js';
import { lane, laneChange } from '../board/lane.js';
import { lostFix } from '../lost-fixes/lost-fix.js';
import { notice } from '../notices/notice.js';

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

/** `lost-fix`: lost fixes as they now stand. Whoever holds only open ones lets go of those that have ended or are closed. */
export const lostFixEvent = z.object({ serverTime: instantMs, lostFixes: z.array(lostFix) });
export type LostFixEvent = z.infer<typeof lostFixEvent>;

/** `notice`: for the one person whose stream it is. Not a place to resume from: missed ones are fetched. */
export const noticeEvent = notice;

export const streamEventNames = ['lanes', 'lost-fix', 'notice', 'beat', 'reset'] as const;
export type StreamEventName = (typeof streamEventNames)[number];
