import { z } from 'zod';
import { id, instantText, latitude, longitude, optionalText } from '../common.js';
import { heightKind } from '../control-points/control-point.js';

/** Differences are rover minus control point, metres, in the local frame at the control point. */
const difference = z.object({ eastM: z.number(), northM: z.number(), upM: z.number().nullable() });

/** Standard deviations of single epochs around their mean, metres; null with fewer than two. */
const scatter = z.object({ eastM: z.number(), northM: z.number(), upM: z.number().nullable() });

/** Either the mean of the rover's newest fixed epochs, or values read off the controller (already reduced to the ground). */
export const checkShotMeasure = z.discriminatedUnion('from', [
  z.object({
    from: z.literal('epochs'),
    epochs: z.number().int('A whole number').min(1, 'At least 1').max(600, 'At most 600'),
  }),
  z.object({
    from: z.literal('typed'),
    latitude,
    longitude,
    heightM: z.number().min(-1000).max(10_000).nullable(),
    heightKind,
  }),
]);
export type CheckShotMeasure = z.infer<typeof checkShotMeasure>;

export const checkShotBody = z.object({
  roverId: id,
  controlPointId: id,
  measure: checkShotMeasure,
  note: optionalText().default(null),
});
export type CheckShotBody = z.infer<typeof checkShotBody>;

/** What a check shot would say, or says; nothing is stored for a preview. */
export const checkShotResult = z.object({
  epochs: z.number().int().nullable().describe('Fixed epochs that went into the mean; null when typed'),
  firstAt: instantText.nullable(),
  lastAt: instantText.nullable(),
  latitude,
  longitude,
  heightM: z.number().nullable().describe('Of the ground, counted like the control point’s'),
  poleHeightM: z
    .number()
    .nullable()
    .describe('What was taken off, offset included; null when typed or unknown'),
  difference,
  scatter: scatter.nullable(),
  horizontalM: z.number(),
  horizontalLimitM: z.number(),
  verticalLimitM: z.number(),
  passed: z.boolean(),
  warnings: z.array(z.string()),
});
export type CheckShotResult = z.infer<typeof checkShotResult>;

export const checkShot = checkShotResult.extend({
  id,
  at: instantText,
  by: z.string(),
  roverId: id,
  roverLabel: z.string(),
  crewId: id.nullable(),
  crewName: z.string().nullable(),
  controlPointId: id,
  controlPointName: z.string(),
  datum: z.string().nullable(),
  stationId: z.number().int().nullable(),
  mountPoint: z.string().nullable(),
  note: z.string().nullable(),
});
export type CheckShot = z.infer<typeof checkShot>;
export const checkShotList = z.object({ checkShots: z.array(checkShot) });
export const checkShotQuery = z.object({
  roverId: z.coerce.number().int().positive().optional(),
  date: z.iso.date().optional().describe('Local day'),
});

/** Why a check shot does not count any more. */
export const againReasons = ['baseChanged', 'cardChanged', 'fixLost', 'newDay'] as const;
export const againReason = z.enum(againReasons);
export type AgainReason = z.infer<typeof againReason>;

export const againWords: Record<AgainReason, string> = {
  baseChanged: 'the base has changed',
  cardChanged: 'the set-up card has changed',
  fixLost: 'the fix was lost for long',
  newDay: 'it is of another day',
};
