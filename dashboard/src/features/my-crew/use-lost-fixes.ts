import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import type { CrewDayView } from '@hubtack/contracts/shifts/shift.js';
import { useMemo } from 'react';

/** Lost fixes of the day, newest first. */
export function useLostFixes(day: CrewDayView | undefined): readonly LostFix[] {
  return useMemo(() => (day?.lostFixes ?? []).toSorted((a, b) => b.startAt - a.startAt), [day]);
}
