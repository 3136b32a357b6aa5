import { checkShotLimits } from '../set-up/check-shot-limits.js';
import { z } from 'zod';
import { shortText } from '../common.js';
import { shiftPattern } from '../crews/crew.js';
import { limits } from '../lost-fixes/limits.js';
import { otherProfiles, toleranceProfile } from '../weekly/tolerance-profile.js';

const isTimeZone = (zone: string): boolean => {
  try {
    new Intl.DateTimeFormat('en', { timeZone: zone });
    return true;
  } catch {
    return false;
  }
};

export const settings = z.object({
  firmName: shortText('the name of the firm'),
  timeZone: z.string().refine(isTimeZone, 'No such time zone; write a name such as Australia/Hobart'),
  units: z.enum(['metric', 'feet']),
  currency: z.string().regex(/^[A-Z]{3}$/, 'Three capital letters, such as AUD (ISO 4217)'),
  /** Positions outside on-shift time are personal data and are dropped unless the firm says otherwise. */
  keepPositionsOffShift: z.boolean(),
  limits,
  toleranceProfile,
  otherProfiles,
  checkShotLimits,
  /** The pattern that a new crew begins with. */
  workingWeek: shiftPattern,
  weeklyMailHour: z.number().int('A whole hour').min(0).max(23),
});
export type Settings = z.infer<typeof settings>;
/** What is left out stays as it is. */
export const settingsBody = settings.partial({
  limits: true,
  toleranceProfile: true,
  otherProfiles: true,
  checkShotLimits: true,
  workingWeek: true,
  weeklyMailHour: true,
});
/** With what whoever runs the server has set. */
export const shownSettings = settings.extend({
  rawEpochDays: z.number().describe('Days for which single positions are kept'),
});
export type ShownSettings = z.infer<typeof shownSettings>;
export type SettingsBody = z.infer<typeof settingsBody>;
