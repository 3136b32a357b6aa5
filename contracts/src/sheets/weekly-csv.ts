import { z } from 'zod';
import { isoWeek } from '../weekly/weekly.js';

/** This week when none is asked for. */
export const weeklyCsvQuery = z.object({ week: isoWeek.optional() });
export type WeeklyCsvQuery = z.infer<typeof weeklyCsvQuery>;
