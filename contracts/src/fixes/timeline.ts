import { z } from 'zod';
import { instantText } from '../common.js';
import { fixState } from './fix-state.js';

const ms = z.number().int().nonnegative();

/** Time spent in each state, whole milliseconds. They add up to the window exactly. */
export const stateTotals = z.object({ fixedMs: ms, floatMs: ms, codeMs: ms, noneMs: ms, silentMs: ms });
export type StateTotals = z.infer<typeof stateTotals>;

export const timelineQuery = z
  .object({ from: instantText, to: instantText })
  .refine((query) => Date.parse(query.to) > Date.parse(query.from), {
    message: '"to" must be after "from"',
    path: ['to'],
  });
export type TimelineQuery = z.infer<typeof timelineQuery>;

/** Spans partition [from, to): no gap, no overlap, neighbours differ in state. */
export const timelineAnswer = z.object({
  spans: z.array(z.object({ state: fixState, start: instantText, end: instantText })),
  totals: stateTotals,
});
export type TimelineAnswer = z.infer<typeof timelineAnswer>;

/** Epochs of a window for a chart, thinned evenly to at most `points`; absent values are null, never 0. */
export const epochSeries = z.object({
  points: z.array(
    z.object({
      at: z.number().int(),
      state: fixState,
      satellites: z.number().int().nullable(),
      ageMs: z.number().int().nullable(),
      hdop: z.number().nullable(),
    }),
  ),
});
export type EpochSeries = z.infer<typeof epochSeries>;
