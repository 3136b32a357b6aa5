import { z } from 'zod';
import { id, instantText, latitude, longitude } from '../common.js';

/** The walk from a name to a base position, in this order. */
export const checkStepNames = [
  'address',
  'connection',
  'sourceTable',
  'mountPoint',
  'login',
  'data',
  'formats',
  'position',
  'base',
] as const;
export const checkStepName = z.enum(checkStepNames);
export type CheckStepName = z.infer<typeof checkStepName>;

export const checkStepLabels: Record<CheckStepName, string> = {
  address: 'Address found',
  connection: 'Connected',
  sourceTable: 'Source table read',
  mountPoint: 'Mount point there',
  login: 'Login accepted',
  data: 'Data arriving',
  formats: 'Formats agree',
  position: 'Position of the rover',
  base: 'Base position',
};

/** `skipped`: an earlier one failed, or the check was cancelled. */
export const checkOutcomes = ['waiting', 'running', 'pass', 'fail', 'skipped'] as const;
export const checkOutcome = z.enum(checkOutcomes);
export type CheckOutcome = z.infer<typeof checkOutcome>;

export const checkStep = z.object({
  step: checkStepName,
  outcome: checkOutcome,
  seen: z.string().describe('What was seen, in words; empty until it has run'),
  toTry: z.string().nullable().describe('What to try, when it failed'),
  warnings: z.array(z.string()).describe('Oddities that do not fail the step'),
  durationMs: z.number().int().nullable(),
});
export type CheckStep = z.infer<typeof checkStep>;

export const suggestedMountPoint = z.object({
  mountPoint: z.string(),
  distanceM: z.number().int().nullable(),
});
export type SuggestedMountPoint = z.infer<typeof suggestedMountPoint>;

export const streamMessage = z.object({
  number: z.number().int(),
  name: z.string(),
  count: z.number().int(),
  intervalSeconds: z.number().nullable().describe('Mean time between two; null with fewer than two'),
});

export const checkedStream = z.object({
  bytes: z.number().int(),
  bytesPerSecond: z.number(),
  firstByteMs: z.number().int().nullable().describe('From the request to the first byte of the stream'),
  frames: z.number().int().describe('RTCM 3 frames whose CRC is right'),
  badFrames: z.number().int().describe('Dropped: CRC wrong, or cut'),
  otherBytes: z.number().int().describe('Bytes outside frames'),
  messages: z.array(streamMessage),
  constellations: z.array(z.string()),
});
export type CheckedStream = z.infer<typeof checkedStream>;

/** More than this is another place: base positions are stated to tenths of a millimetre and do not wander. */
export const BASE_MOVED_M = 0.02;

export const checkedBase = z.object({
  stationId: z.number().int(),
  latitude,
  longitude,
  heightM: z.number().describe('Above the ellipsoid'),
  antennaHeightM: z.number().nullable().describe('Message 1006 only'),
  isVirtual: z.boolean().describe('The source table or the message says that it is computed, not a station'),
  distanceM: z.number().int().nullable().describe('To the place that the check was made for'),
  horizontalMm: z.number().nullable().describe('8 mm + 1 ppm (common practice)'),
  verticalMm: z.number().nullable().describe('15 mm + 1 ppm (common practice)'),
  movedM: z.number().nullable().describe('Against the last check that read a base; null when there was none'),
  stationBefore: z.number().int().nullable().describe('Station id of that check, when it was another'),
});
export type CheckedBase = z.infer<typeof checkedBase>;

export const checkReport = z.object({
  steps: z.array(checkStep),
  spellings: z.array(suggestedMountPoint).describe('Nearest spellings, best first'),
  nearest: z.array(suggestedMountPoint).describe('Nearest by distance'),
  stream: checkedStream.nullable(),
  base: checkedBase.nullable(),
});
export type CheckReport = z.infer<typeof checkReport>;

export const checkStatuses = ['running', 'done', 'cancelled'] as const;

/** One check of a source. Running ones are asked for again until they are not. */
export const correctionCheck = checkReport.extend({
  id,
  sourceId: id,
  status: z.enum(checkStatuses),
  startedAt: instantText,
  endedAt: instantText.nullable(),
  by: z.string().nullable().describe('Null: the timetable'),
  passed: z.boolean().nullable().describe('Null while it runs, or cancelled'),
  failedStep: checkStepName.nullable(),
  place: z.string().nullable().describe('What it was made for: a site or a rover, in words'),
});
export type CorrectionCheck = z.infer<typeof correctionCheck>;

export const correctionCheckList = z.object({
  checks: z.array(
    correctionCheck.pick({
      id: true,
      status: true,
      startedAt: true,
      endedAt: true,
      by: true,
      passed: true,
      failedStep: true,
      place: true,
    }),
  ),
});
export type CorrectionCheckList = z.infer<typeof correctionCheckList>;

/** For which place: distances count from it, and its position is what is sent to a network. */
export const startCheckBody = z
  .object({ siteId: id.optional(), roverId: id.optional() })
  .refine(({ siteId, roverId }) => siteId === undefined || roverId === undefined, {
    path: ['roverId'],
    message: 'A site or a rover, not both',
  });
export type StartCheckBody = z.infer<typeof startCheckBody>;
