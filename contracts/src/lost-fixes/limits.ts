import { z } from 'zod';

const seconds = (most: number) => z.number().int('Whole seconds').min(1, 'At least 1').max(most);

/**
 * Limits of the detector and the diagnosis: settings of the firm. Defaults are common practice, no source; that they
 * differ from place to place is why they are settings.
 */
export const limits = z
  .object({
    lostAfterSeconds: seconds(3600).describe('A lost fix counts from this length on'),
    regainedAfterSeconds: seconds(600).describe('A fixed run shorter than this is no fix'),
    firstFixWithinMinutes: z.number().int().min(1).max(240),
    heardWithinMinutes: z.number().int().min(1).max(240),
    maxAgeSeconds: z.number().min(1).max(600).describe('Corrections older than this have stopped'),
    ageClearsSeconds: z.number().min(0.5).max(600).describe('and come again under this'),
    minSatellites: z.number().int().min(3).max(40),
    maxHdop: z.number().min(0.5).max(20),
    maxBaselineKm: z.number().min(1).max(500),
  })
  .refine(({ ageClearsSeconds, maxAgeSeconds }) => ageClearsSeconds <= maxAgeSeconds, {
    path: ['ageClearsSeconds'],
    message: 'Not above the age at which corrections count as stopped',
  });
export type Limits = z.infer<typeof limits>;

export const defaultLimits: Limits = {
  lostAfterSeconds: 30,
  regainedAfterSeconds: 15,
  firstFixWithinMinutes: 5,
  heardWithinMinutes: 10,
  maxAgeSeconds: 10,
  ageClearsSeconds: 5,
  minSatellites: 6,
  maxHdop: 3,
  maxBaselineKm: 20,
};
