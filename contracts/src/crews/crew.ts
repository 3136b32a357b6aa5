import { z } from 'zod';
import { id, shortText } from '../common.js';

const clockTime = z.string().regex(/^([01]\d|2[0-3]):[0-5]\d$/, 'Write a time such as 07:00');

/** One line of the weekly pattern, in the firm's zone. An end at or before the start runs past midnight. */
export const shiftPatternDay = z.object({
  weekday: z.number().int().min(1).max(7).describe('ISO 8601: 1 Monday to 7 Sunday'),
  start: clockTime,
  end: clockTime,
});
export type ShiftPatternDay = z.infer<typeof shiftPatternDay>;
/** Until a firm says otherwise. */
export const mondayToFriday: ShiftPatternDay[] = [1, 2, 3, 4, 5].map((weekday) => ({
  weekday,
  start: '07:00',
  end: '15:30',
}));

export const shiftPattern = z
  .array(shiftPatternDay)
  .max(7)
  .refine(
    (days) => new Set(days.map((day) => day.weekday)).size === days.length,
    'One line for each weekday',
  );

export const crewBody = z.object({
  name: shortText('the name of the crew'),
  phone: z
    .string()
    .trim()
    .max(40)
    .regex(/^[+\d][\d ()-]*$/, 'Digits, spaces, brackets and hyphens only')
    .nullable(),
  siteId: id.nullable(),
  hourlyRate: z.number().min(0, 'Not below zero').max(100_000).nullable(),
  pattern: shiftPattern,
  /** Name of the tolerance profile that its work is judged by; null is the firm's. */
  toleranceProfile: shortText('the name of the profile', 40).nullable().default(null),
});
export type CrewBody = z.infer<typeof crewBody>;

export const crew = crewBody.extend({
  id,
  siteName: z.string().nullable(),
  rovers: z.array(z.object({ id, label: z.string() })),
  active: z.boolean(),
});
export type Crew = z.infer<typeof crew>;
export const crewList = z.array(crew);
export const changeCrewBody = crewBody.extend({ active: z.boolean() });
export type ChangeCrewBody = z.infer<typeof changeCrewBody>;
