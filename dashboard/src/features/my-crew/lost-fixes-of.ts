import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';

/** The day's, with the open ones of the crew as they stand now, and what they hang under. Newest first. */
export function lostFixesOf(
  ofDay: readonly LostFix[],
  open: readonly LostFix[],
  crewId: number,
): readonly LostFix[] {
  const own = open.filter((lostFix) => lostFix.crewId === crewId);
  const shared = new Set([...ofDay, ...own].map(({ sharedId }) => sharedId));
  const live = open.filter(({ id, crewId: crew }) => crew === crewId || shared.has(id));
  const byId = new Map([...ofDay, ...live].map((lostFix) => [lostFix.id, lostFix]));
  return [...byId.values()].toSorted((a, b) => b.startAt - a.startAt);
}
