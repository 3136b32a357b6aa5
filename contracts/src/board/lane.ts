import { z } from 'zod';
import { againReason } from '../set-up/check-shot.js';
import { id, instantMs } from '../common.js';
import { fixState } from '../fixes/fix-state.js';
import { lostFix } from '../lost-fixes/lost-fix.js';
import { stateTotals } from '../fixes/timeline.js';

/** A run of one state, [start, end) in ms UTC. Silence is what no span covers. */
export const ribbonSpan = z.object({ state: fixState, start: instantMs, end: instantMs });
export type RibbonSpan = z.infer<typeof ribbonSpan>;

/** What on-shift time says of the crew right now. `noShiftSet`: neither marks nor a weekly pattern exist for today. */
export const duties = ['onShift', 'paused', 'offShift', 'noShiftSet'] as const;
export const duty = z.enum(duties);
export type Duty = z.infer<typeof duty>;

/** The part of a lane that moves with every sentence. Absent figures are null, never 0. */
export const laneChange = z.object({
  id: id.describe('The rover'),
  state: fixState,
  since: instantMs.nullable().describe('Start of the current run; null when never heard'),
  lastEpochAt: instantMs.nullable(),
  heldUntil: instantMs.nullable().describe('Without another epoch the rover is silent from here on'),
  satellites: z.number().int().nullable(),
  ageMs: z.number().int().nullable(),
  hdop: z.number().nullable(),
  stationId: z.number().int().nullable(),
  latitude: z.number().nullable(),
  longitude: z.number().nullable(),
  baseDistanceM: z.number().nullable(),
  duty,
  /** On-shift time of the local day by state, up to `todayAsOf`; the current state goes on from there. */
  today: stateTotals,
  todayAsOf: instantMs,
  /** Spans of the last hour; sent when they changed other than by the current one growing. */
  ribbon: z.array(ribbonSpan).optional(),
});
export type LaneChange = z.infer<typeof laneChange>;

/** One rover on the board, with its crew. */
export const lane = laneChange.extend({
  ribbon: z.array(ribbonSpan),
  roverLabel: z.string(),
  crewId: id.nullable(),
  crewName: z.string().nullable(),
  crewPhone: z.string().nullable(),
  siteName: z.string().nullable(),
  mountPoint: z.string().nullable(),
  /** Today's newest set-up card of the rover. */
  setUp: z.object({ at: instantMs, by: z.string(), poleHeightM: z.number() }).nullable(),
  /** Its newest check shot of the last days; `again` says why it does not count any more. */
  checkShot: z
    .object({
      at: instantMs,
      horizontalMm: z.number().int(),
      passed: z.boolean(),
      again: againReason.nullable(),
    })
    .nullable(),
  /** Times of the last hour that are not on shift because of a pause: drawn hatched. */
  pauses: z.array(z.object({ start: instantMs, end: instantMs })),
});
export type Lane = z.infer<typeof lane>;

export const boardSnapshot = z.object({
  cursor: z.string(),
  serverTime: instantMs,
  lanes: z.array(lane),
  lostFixes: z.array(lostFix).describe('Those that have not ended, and are not closed'),
});
export type BoardSnapshot = z.infer<typeof boardSnapshot>;

/** On-shift time by state of one crew today, whole and by local hour, for the board's chart. */
export const boardToday = z.object({
  dayStart: instantMs,
  dayEnd: instantMs,
  crews: z.array(
    z.object({
      crewId: id,
      crewName: z.string(),
      totals: stateTotals,
      hours: z.array(z.object({ start: instantMs, totals: stateTotals })),
    }),
  ),
});
export type BoardToday = z.infer<typeof boardToday>;
