import { z } from 'zod';
import type { Role } from '../auth/role.js';

/** `weekly`: the week before, on Monday. `daily`: a crew's day, when its shift has ended. */
export const sheetKinds = ['weekly', 'daily'] as const;
export const sheetKind = z.enum(sheetKinds);
export type SheetKind = z.infer<typeof sheetKind>;

/** Which sheets a role may have sent: the week is the office's, the day the crew chief's own. */
export const sheetsOfRole: Record<Role, readonly SheetKind[]> = {
  manager: ['weekly'],
  dispatcher: ['weekly'],
  technician: ['weekly'],
  crewChief: ['daily'],
};

export const subscriptionList = z.object({
  sheets: z
    .array(z.object({ sheet: sheetKind, isOn: z.boolean() }))
    .describe('Every sheet that my role may have'),
  weeklyMailHour: z.number().int().describe('Local hour of Monday at which the weekly sheet goes out'),
  timeZone: z.string(),
  isMailSet: z.boolean().describe('False: the server has no mail server to hand mails to'),
});
export type SubscriptionList = z.infer<typeof subscriptionList>;

/** All that I want; what is not named is switched off. */
export const subscriptionsBody = z.object({ sheets: z.array(sheetKind).max(sheetKinds.length) });
export type SubscriptionsBody = z.infer<typeof subscriptionsBody>;
