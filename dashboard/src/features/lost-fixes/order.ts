import type { LostFix, LostFixKind } from '@hubtack/contracts/lost-fixes/lost-fix.js';

export interface DeskGroup {
  name: 'Open' | 'Taken' | 'Ended, to be closed';
  lostFixes: LostFix[];
}

const kindsByNeed: readonly LostFixKind[] = ['mountPoint', 'lostFix', 'noFirstFix', 'notHeard', 'flag'];

/** What needs somebody first: a fix that looks wrong, then what a chief has flagged, then by kind. */
function needOf({ flag, kind }: LostFix): number {
  if (flag?.word === 'fixLooksWrong') return 0;
  if (flag) return 1;
  return 2 + kindsByNeed.indexOf(kind);
}

/** By need, within it the longest first; what is shelved waits at the end. */
export const byNeed = (a: LostFix, b: LostFix): number =>
  Number(a.shelved !== null) - Number(b.shelved !== null) ||
  needOf(a) - needOf(b) ||
  a.startAt - b.startAt ||
  a.id - b.id;

/** The desk in groups. What hangs under a mount point’s lost fix is shown with it, as long as that is on the desk. */
export function deskGroups(active: readonly LostFix[]): DeskGroup[] {
  const ids = new Set(active.map(({ id }) => id));
  const own = active.filter(({ sharedId }) => sharedId === null || !ids.has(sharedId));
  const of = (status: LostFix['status']) => own.filter((one) => one.status === status).toSorted(byNeed);
  const groups: DeskGroup[] = [
    { name: 'Open', lostFixes: of('open') },
    { name: 'Taken', lostFixes: of('taken') },
    { name: 'Ended, to be closed', lostFixes: of('ended') },
  ];
  return groups.filter(({ lostFixes }) => lostFixes.length > 0);
}

/** How long it has lasted, pauses taken off, ms. */
export const lengthMs = ({ startAt, endAt, pausedMs }: LostFix, now: number): number =>
  Math.max(0, (endAt ?? now) - startAt - pausedMs);
