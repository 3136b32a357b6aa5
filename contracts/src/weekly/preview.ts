import { z } from 'zod';
import { limits } from '../lost-fixes/limits.js';
import { otherProfiles, toleranceProfile } from './tolerance-profile.js';
import { isoWeek, weekFigures } from './weekly.js';

export const previewBody = z.object({ limits, toleranceProfile, otherProfiles: otherProfiles.default([]) });
export type PreviewBody = z.infer<typeof previewBody>;

/** Figures of the last whole week as they are, and as they would be. */
export const preview = z.object({
  week: isoWeek,
  before: weekFigures,
  after: weekFigures,
  /** Rover-shifts that would be worked out again, in all. */
  shifts: z.number().int(),
});
export type Preview = z.infer<typeof preview>;
