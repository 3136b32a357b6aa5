import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import type { CrewDayView } from '@hubtack/contracts/shifts/shift.js';
import { useMemo } from 'react';
import { useOpenLostFixes } from '../../live/use-lanes';
import { lostFixesOf } from './lost-fixes-of';

/** Lost fixes of the day, newest first; open ones as the stream has them, so that advice comes at once. */
export function useLostFixes(day: CrewDayView | undefined, crewId: number): readonly LostFix[] {
  const open = useOpenLostFixes();
  return useMemo(() => lostFixesOf(day?.lostFixes ?? [], [...open.values()], crewId), [day, open, crewId]);
}
