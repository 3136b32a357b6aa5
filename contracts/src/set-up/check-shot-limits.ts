import { z } from 'zod';

/**
 * When a check shot passes, and when it must be taken again: part of the firm's tolerance profile. Defaults: common
 * practice for topographic work (20 to 30 mm in plan, 30 to 50 mm in height), no source.
 */
export const checkShotLimits = z.object({
  horizontalM: z.number().min(0.001, 'At least a millimetre').max(1, 'At most a metre'),
  verticalM: z.number().min(0.001, 'At least a millimetre').max(1, 'At most a metre'),
  /** A fix that was lost for longer asks for another check. */
  againAfterLostMinutes: z.number().int('Whole minutes').min(1, 'At least 1').max(480),
});
export type CheckShotLimits = z.infer<typeof checkShotLimits>;

export const defaultCheckShotLimits: CheckShotLimits = {
  horizontalM: 0.03,
  verticalM: 0.05,
  againAfterLostMinutes: 10,
};
