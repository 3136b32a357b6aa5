import { z } from 'zod';
import { id, instantText } from '../common.js';
import { fixState } from '../fixes/fix-state.js';
import { stateTotals } from '../fixes/timeline.js';
import { cause } from '../lost-fixes/cause.js';

export const MAX_LOG_BYTES = 100 * 1024 * 1024;

export const logStatuses = ['waiting', 'reading', 'done', 'failed', 'cancelled'] as const;
export const logStatus = z.enum(logStatuses);
export type LogStatus = z.infer<typeof logStatus>;

/** Totals and transitions are over [firstTime, lastTime). */
export const logSummary = z.object({
  sentences: z.number().int(),
  ggaSentences: z.number().int(),
  badChecksum: z.number().int(),
  malformed: z.number().int(),
  ignored: z.number().int().describe('Sentences that nothing is read from'),
  untimed: z.number().int(),
  epochs: z.number().int(),
  duplicates: z.number().int(),
  firstTime: instantText.nullable(),
  lastTime: instantText.nullable(),
  totals: stateTotals,
  transitions: z.array(z.object({ time: instantText, from: fixState, to: fixState })),
  moreTransitions: z.number().int().describe('Beyond those listed'),
  medianSatellites: z.number().nullable(),
  maxAgeSeconds: z.number().nullable(),
});
export type LogSummary = z.infer<typeof logSummary>;

export const logLoss = z.object({
  start: instantText,
  end: instantText.nullable(),
  cause,
  evidence: z.array(z.string()),
});
export type LogLoss = z.infer<typeof logLoss>;

/** What the page draws beside the summary. */
export const logDetail = z.object({
  spans: z.array(z.object({ state: fixState, start: z.number().int(), end: z.number().int() })),
  points: z.array(
    z.object({
      at: z.number().int(),
      state: fixState,
      satellites: z.number().int().nullable(),
      ageMs: z.number().int().nullable(),
      hdop: z.number().nullable(),
    }),
  ),
  losses: z.array(logLoss),
  rejected: z.array(
    z.object({ line: z.number().int(), code: z.string(), detail: z.string(), text: z.string() }),
  ),
  moreRejected: z.number().int(),
  dateFrom: z.enum(['given', 'sentences', 'arrival']).nullable().describe('Where the day was taken from'),
});
export type LogDetail = z.infer<typeof logDetail>;

export const log = z.object({
  id,
  name: z.string().describe('Of the file'),
  bytes: z.number().int(),
  at: instantText,
  by: z.string(),
  roverId: id.nullable(),
  roverLabel: z.string().nullable(),
  status: logStatus,
  progress: z.number().min(0).max(1),
  problem: z.string().nullable().describe('Why it failed, in words'),
  summary: logSummary.nullable(),
});
export type Log = z.infer<typeof log>;
export const logWithDetail = log.extend({ detail: logDetail.nullable() });
export type LogWithDetail = z.infer<typeof logWithDetail>;
export const logList = z.object({ logs: z.array(log) });
export const acceptedLog = z.object({ id });
