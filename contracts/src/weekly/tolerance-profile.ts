import { z } from 'zod';
import { shortText } from '../common.js';

/** When a fix is good enough to work with. The one in the settings counts for all figures. */
export const toleranceProfile = z.object({
  name: shortText('the name of the profile', 40),
  maxAgeSeconds: z.number().min(1, 'At least 1').max(600),
  maxHdop: z.number().min(0.5, 'At least 0.5').max(20),
  minSatellites: z.number().int('A whole number').min(3, 'At least 3').max(40),
});
export type ToleranceProfile = z.infer<typeof toleranceProfile>;

export const topographic: ToleranceProfile = {
  name: 'topographic',
  maxAgeSeconds: 10,
  maxHdop: 2,
  minSatellites: 6,
};
