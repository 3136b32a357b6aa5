import { dueNotices, type DueNotice } from './notice-policy.js';
import type { PolicyLostFix, PolicyPerson } from './notice-tellings.js';

export interface NoticeTime extends DueNotice {
  at: number;
}

const MINUTE_MS = 60_000;

/**
 * Everything that one person would have been told over a whole day of lost fixes, in order, the board looking at every instant at which
 * something could come due. Each lost fix is taken as it stood at that instant; only chattering and the shelf are as they stand in the end.
 */
export function noticeTimes(person: PolicyPerson, lostFixes: readonly PolicyLostFix[]): NoticeTime[] {
  const raisedAt = new Map(lostFixes.map((one) => [one.id, one.raisedAt]));
  const told = new Set<string>();
  const times: NoticeTime[] = [];
  for (const at of instantsOf(person, lostFixes)) {
    const standing = lostFixes
      .map((one) => asOf(one, at, raisedAt))
      .filter((one) => one !== null && one.closedAt === null) as PolicyLostFix[];
    for (const notice of dueNotices(person, standing, told, at).notices) {
      told.add(notice.dueKey);
      times.push({ ...notice, at });
    }
  }
  return times;
}

function instantsOf({ rules }: PolicyPerson, lostFixes: readonly PolicyLostFix[]): number[] {
  const delays = [0, ...new Set(rules.map(({ afterMinutes }) => afterMinutes * MINUTE_MS))];
  const instants = lostFixes.flatMap(({ raisedAt, flagAt, shelvedUntil, backAt, advice }) =>
    [raisedAt, flagAt, shelvedUntil, backAt, ...advice.map(({ at }) => at)]
      .filter((at) => at !== null)
      .flatMap((at) => delays.map((delay) => at + delay)),
  );
  return [...new Set(instants)].toSorted((a, b) => a - b);
}

/** A lost fix as it stood at an instant; null before there was one. */
function asOf(
  lostFix: PolicyLostFix,
  at: number,
  raisedAtOf: ReadonlyMap<number, number>,
): PolicyLostFix | null {
  const past = (instant: number | null) => (instant !== null && instant <= at ? instant : null);
  const flagAt = past(lostFix.flagAt);
  const isRaised = lostFix.raisedAt <= at;
  if (!isRaised && flagAt === null) return null;
  const { sharedId } = lostFix;
  const takenAt = past(lostFix.takenAt);
  return {
    ...lostFix,
    kind: isRaised ? lostFix.kind : 'flag',
    endAt: past(lostFix.endAt),
    closedAt: past(lostFix.closedAt),
    sharedId: sharedId !== null && (raisedAtOf.get(sharedId) ?? at) <= at ? sharedId : null,
    flagAt,
    flagWord: flagAt === null ? null : lostFix.flagWord,
    backAt: past(lostFix.backAt),
    takenAt,
    takenByUserId: takenAt === null ? null : lostFix.takenByUserId,
    advice: lostFix.advice.filter((one) => one.at <= at),
  };
}
