import { z } from 'zod';

export const fixStates = ['fixed', 'float', 'code', 'none', 'silent'] as const;
/** What the receiver claims about its position at an instant; `silent` is the absence of any claim. */
export const fixState = z.enum(fixStates);
export type FixState = z.infer<typeof fixState>;
export type HeardState = Exclude<FixState, 'silent'>;

/**
 * Fix state of a GGA quality indicator (GGA field 6; NMEA 0183 note to GGA, "NMEA Revealed" section GGA).
 * 9 is not in the standard; seen in the field for satellite-based augmentation, it counts as a code position.
 */
export function fixStateOfQuality(quality: number): HeardState {
  switch (quality) {
    case 4:
      return 'fixed';
    case 5:
      return 'float';
    case 1:
    case 2:
    case 3:
    case 9:
      return 'code';
    default:
      return 'none';
  }
}

export const fixStateWords: Record<FixState, string> = {
  fixed: 'Fixed',
  float: 'Float',
  code: 'Code only',
  none: 'No position',
  silent: 'Quiet',
};
