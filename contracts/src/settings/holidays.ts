import { z } from 'zod';
import { shortText } from '../common.js';

/** A local day on which no pattern counts; marks do. */
export const holiday = z.object({
  day: z.iso.date('Write a date such as 2026-12-25'),
  name: shortText('the name of the day', 60),
});
export type Holiday = z.infer<typeof holiday>;

export const holidays = z
  .array(holiday)
  .max(500, 'At most 500 days')
  .refine((list) => new Set(list.map(({ day }) => day)).size === list.length, 'One line for each day');
