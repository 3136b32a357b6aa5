import { z } from 'zod';
import { id, instantText, latitude, longitude, shortText } from '../common.js';
import { checkStatuses, checkStepName } from './check.js';
import { impossible } from './typing-faults.js';

/** Which observation messages a rover can use: MSM (1071 and up), the legacy ones (1001 to 1012), or either. */
export const correctionFormats = ['any', 'msm', 'legacy'] as const;
export const correctionFormat = z.enum(correctionFormats);
export type CorrectionFormat = z.infer<typeof correctionFormat>;

export const correctionFormatLabels: Record<CorrectionFormat, string> = {
  any: 'Either',
  msm: 'RTCM 3, MSM messages',
  legacy: 'RTCM 3, legacy messages (1001 to 1012)',
};

/** At most every quarter of an hour: a check is a visitor on somebody else's machine. */
export const WATCH_MINUTES_LEAST = 15;

const typed = (field: 'address' | 'mountPoint' | 'user', what: string, max: number) =>
  z
    .string()
    .min(1, `Write ${what}`)
    .max(max, `At most ${max} characters`)
    .superRefine((text, context) => {
      for (const message of impossible(field, text)) context.addIssue({ code: 'custom', message });
    });

const source = z.object({
  name: shortText('a name'),
  address: typed('address', 'the address of the caster', 253),
  port: z.number().int('A whole number').min(1, '1 to 65535').max(65_535, '1 to 65535'),
  mountPoint: typed('mountPoint', 'the mount point', 100),
  /** Null: no login. RFC 7617: a colon would end the user name. */
  user: typed('user', 'the user', 100).nullable().default(null),
  ntripVersion: z.union([z.literal(1), z.literal(2)]).default(2),
  tls: z.boolean().default(false),
  /** Networks that compute a virtual base need the rover's position. */
  sendPosition: z.boolean().default(false),
  expectedFormat: correctionFormat.default('any'),
  /** Minutes between checks on a timetable; null is off. */
  watchMinutes: z
    .number()
    .int('Whole minutes')
    .min(WATCH_MINUTES_LEAST, `At least ${WATCH_MINUTES_LEAST} minutes`)
    .max(1440, 'At most a day')
    .nullable()
    .default(null),
  /** Where the base is said to be, until a check has read it from the stream. */
  baseLatitude: latitude.nullable().default(null),
  baseLongitude: longitude.nullable().default(null),
});

/** A password goes in and never comes out. Left out: it stays as it is; null: it is taken away. */
export const correctionSourceBody = source.extend({
  password: z.string().min(1, 'Write the password').max(200, 'At most 200 characters').nullable().optional(),
});
export type CorrectionSourceBody = z.infer<typeof correctionSourceBody>;

/** What was read from message 1005 or 1006 at the last check that had one. */
export const decodedBase = z.object({
  at: instantText,
  stationId: z.number().int(),
  latitude,
  longitude,
  heightM: z.number().describe('Above the ellipsoid'),
});
export type DecodedBase = z.infer<typeof decodedBase>;

export const correctionSource = source.extend({
  id,
  hasPassword: z.boolean(),
  decodedBase: decodedBase.nullable().describe('Null for a virtual base, and until a check has read one'),
  lastCheck: z
    .object({
      id,
      at: instantText,
      status: z.enum(checkStatuses),
      passed: z.boolean().nullable().describe('Null while it runs or cancelled'),
      failedStep: checkStepName.nullable(),
    })
    .nullable(),
  downSince: instantText
    .nullable()
    .describe('Since when checks find it down; null while it is up or unknown'),
});
export type CorrectionSource = z.infer<typeof correctionSource>;
export const correctionSourceList = z.array(correctionSource);
