import { z } from 'zod';
import { shortText } from '../common.js';

/** When a fix is good enough to work with. */
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

/** Beside the firm's own: for crews whose work asks for more, or for less. */
export const otherProfiles = z
  .array(toleranceProfile)
  .max(8, 'At most 8')
  .refine((list) => new Set(list.map(({ name }) => name)).size === list.length, 'Each name once');

export interface Profiles {
  /** The firm's: it counts for every crew that has none of its own. */
  toleranceProfile: ToleranceProfile;
  otherProfiles: readonly ToleranceProfile[];
}

/** The profile that counts under this name; the firm's for no name, and for one that is no longer there. */
export const profileOf = ({ toleranceProfile: firm, otherProfiles: others }: Profiles, name: string | null) =>
  others.find((profile) => profile.name === name) ?? firm;
