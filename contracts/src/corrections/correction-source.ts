import { z } from 'zod';
import { id, latitude, longitude, shortText } from '../common.js';

/** Where a rover's corrections come from. The login and its check come with the correction check. */
export const correctionSourceBody = z.object({
  name: shortText('a name'),
  address: shortText('the address of the caster', 253),
  port: z.number().int().min(1, '1 to 65535').max(65_535, '1 to 65535'),
  mountPoint: shortText('the mount point', 100),
  baseLatitude: latitude.nullable(),
  baseLongitude: longitude.nullable(),
});
export type CorrectionSourceBody = z.infer<typeof correctionSourceBody>;
export const correctionSource = correctionSourceBody.extend({ id });
export type CorrectionSource = z.infer<typeof correctionSource>;
export const correctionSourceList = z.array(correctionSource);
