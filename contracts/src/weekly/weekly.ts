import { z } from 'zod';
import { id, instantMs } from '../common.js';
import { stateTotals } from '../fixes/timeline.js';
import { confirmedCause } from '../lost-fixes/cause.js';

/** ISO 8601 week such as 2026-W53. Whether the year has it is judged by the server. */
export const isoWeek = z.string().regex(/^\d{4}-W\d{2}$/, 'Write a week such as 2026-W40');
export const weeklyQuery = z.object({ week: isoWeek.optional(), compare: isoWeek.optional() });
export type WeeklyQuery = z.infer<typeof weeklyQuery>;

const ms = z.number().int().nonnegative();

/** How long it took: mean and 90th percentile (Hyndman-Fan type 7), ms; null without any. */
export const lengths = z.object({ n: z.number().int(), meanMs: ms.nullable(), p90Ms: ms.nullable() });
export type Lengths = z.infer<typeof lengths>;

/** Figures of any number of rover-shifts: sums of times, of which shares are taken afterwards. */
export const weekFigures = z.object({
  totals: stateTotals.describe('On-shift time by state; together all of it'),
  withinToleranceMs: ms.describe('Fixed, and age, HDOP and satellites within the tolerance profile'),
  lostFixes: z.number().int(),
  regain: lengths.describe('From the loss to the fix that holds, or the end of the shift; pauses taken off'),
  firstFix: lengths.describe('From the first report of a shift to its first fix that holds'),
  paidWithoutFixMs: ms,
  cost: z
    .number()
    .nullable()
    .describe('Paid time without a fix at the crews’ hourly rates; null: not known, or not for this role'),
});
export type WeekFigures = z.infer<typeof weekFigures>;

export const weekDay = z.object({
  day: z.string().describe('Local day, YYYY-MM-DD'),
  onShiftMs: ms,
  fixedMs: ms,
});

export const weekCrew = z.object({
  crewId: id,
  crewName: z.string(),
  figures: weekFigures,
  days: z.array(weekDay),
});
export type WeekCrew = z.infer<typeof weekCrew>;

/** Lost time by cause: confirmed by a person, or only likely. */
export const weekCause = z.object({
  cause: confirmedCause,
  isConfirmed: z.boolean(),
  lostMs: ms,
  lostFixes: z.number().int(),
});
export type WeekCause = z.infer<typeof weekCause>;

export const weekMountPoint = z.object({
  mountPoint: z.string().nullable(),
  lostMs: ms,
  lostFixes: z.number().int(),
  onShiftMs: ms,
  fixedMs: ms,
});
export const weekRover = z.object({ roverId: id, roverLabel: z.string(), figures: weekFigures, lostMs: ms });

/** One rover-shift, cut at midnight: the rows that everything else is a sum of. */
export const weekShift = z.object({
  day: z.string(),
  crewId: id,
  crewName: z.string(),
  roverId: id,
  roverLabel: z.string(),
  start: instantMs,
  end: instantMs.nullable(),
  basis: z.enum(['marks', 'pattern', 'noShiftSet']),
  figures: weekFigures,
});
export type WeekShift = z.infer<typeof weekShift>;

export const weekly = z.object({
  week: isoWeek,
  from: instantMs,
  to: instantMs,
  timeZone: z.string(),
  currency: z.string(),
  firmName: z.string(),
  isPart: z.boolean().describe('The week is not over, or has not begun'),
  asOf: instantMs,
  sentence: z.string(),
  total: weekFigures,
  fourBefore: z.object({ onShiftMs: ms, fixedMs: ms }),
  compared: z.object({ week: isoWeek, total: weekFigures }).nullable(),
  crews: z.array(weekCrew),
  weeks: z.array(z.object({ week: isoWeek, onShiftMs: ms, fixedMs: ms })).describe('Twelve, this one last'),
  causes: z.array(weekCause),
  mountPoints: z.array(weekMountPoint),
  rovers: z.array(weekRover),
  shifts: z.array(weekShift),
  profile: z.object({
    name: z.string(),
    maxAgeSeconds: z.number(),
    maxHdop: z.number(),
    minSatellites: z.number().int(),
  }),
});
export type Weekly = z.infer<typeof weekly>;
