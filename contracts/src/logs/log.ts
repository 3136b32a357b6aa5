import { z } from 'zod';
import { id, idParam, instantText } from '../common.js';
import { fixState } from '../fixes/fix-state.js';
import { stateTotals } from '../fixes/timeline.js';
import { cause } from '../lost-fixes/cause.js';

export const MAX_LOG_BYTES = 100 * 1024 * 1024;

export const logStatuses = ['waiting', 'reading', 'done', 'failed', 'cancelled'] as const;
export const logStatus = z.enum(logStatuses);
export type LogStatus = z.infer<typeof logStatus>;

/** What comes beside the file, as text in a form. */
export const logFields = z.object({
  date: z.iso
    .date('Write the UTC date of the first sentence as YYYY-MM-DD')
    .optional()
    .describe('UTC date of the first sentence'),
  roverId: idParam.optional().describe('Also enter the epochs into the history of this rover'),
});
export type LogFields = z.infer<typeof logFields>;

/** Totals and transitions are over [firstTime, lastTime). */
export const logSummary = z.object({
  sentences: z.number().int().describe('All that begin like one, faulty ones too'),
  ggaSentences: z.number().int().describe('Those that could be read'),
  badChecksum: z.number().int(),
  malformed: z.number().int().describe('Faulty in another way'),
  ignored: z
    .number()
    .int()
    .describe('Sentences that nothing is read from, and lines that are none, as the ingest counts them'),
  untimed: z.number().int().describe('GGAs that nothing says the time of'),
  epochs: z.number().int().describe('One for each instant'),
  duplicates: z.number().int().describe('Further GGAs of an instant that is there already'),
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

/** What became of the epochs in the history of the rover. */
export const logHistory = z.object({
  accepted: z.number().int(),
  duplicates: z.number().int().describe('There already'),
  refused: z.number().int(),
  reasons: z.array(z.string()).describe('Why some were refused, in words'),
});
export type LogHistory = z.infer<typeof logHistory>;

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
  notes: z.array(z.string()).describe('What a reader of the figures should know, in words'),
  history: logHistory.nullable().describe('Null without a rover'),
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
  summary: logSummary.nullable().describe('In the list without the transitions themselves'),
});
export type Log = z.infer<typeof log>;
export const logWithDetail = log.extend({ detail: logDetail.nullable() });
export type LogWithDetail = z.infer<typeof logWithDetail>;
export const logList = z.object({ logs: z.array(log) });
export const acceptedLog = z.object({ id });
