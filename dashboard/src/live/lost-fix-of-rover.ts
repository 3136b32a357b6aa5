import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';

/** The one that matters most of a rover's open lost fixes: flagged by a person, else the newest. */
export function lostFixOfRover(lostFixes: Iterable<LostFix>, roverId: number): LostFix | undefined {
  let found: LostFix | undefined;
  for (const lostFix of lostFixes) {
    if (lostFix.roverId !== roverId) continue;
    const isMore = !found || (lostFix.flag && !found.flag) || (!found.flag && lostFix.id > found.id);
    if (isMore) found = lostFix;
  }
  return found;
}
