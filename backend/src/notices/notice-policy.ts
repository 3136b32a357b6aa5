import { noticeWays, type NoticeSubject, type NoticeWay } from '@hubtack/contracts/notices/notice.js';
import {
  dueAt,
  flagKey,
  isDue,
  isOpen,
  tellingsOf,
  type Occasion,
  type PolicyLostFix,
  type PolicyPerson,
  type Telling,
} from './notice-tellings.js';

export interface DueNotice {
  userId: number;
  lostFixId: number;
  subject: NoticeSubject;
  occasion: Occasion;
  /** Lost fix, occasion and minutes: told once to each person. */
  dueKey: string;
  ways: NoticeWay[];
}

export interface Due {
  notices: DueNotice[];
  /** When something may be due next if nothing else changes; null when nothing waits. */
  nextAt: number | null;
}

const NOT_TOLD = -1;

/**
 * What one person is to be told now (design: "Notices"). `lostFixes`: all that are not closed, those that hang under another included.
 * `told`: due keys of this person so far. What has come due by several rules meanwhile is told once, by all their ways.
 */
export function dueNotices(
  person: PolicyPerson,
  lostFixes: readonly PolicyLostFix[],
  told: ReadonlySet<string>,
  now: number,
): Due {
  const toldMinutes = longestToldMinutes(told);
  const notices: DueNotice[] = [];
  let nextAt = Infinity;
  for (const lostFix of lostFixes) {
    if (lostFix.closedAt !== null || !concerns(person, lostFix, lostFixes)) continue;
    const { shelvedUntil } = lostFix;
    if (shelvedUntil !== null && shelvedUntil > now) nextAt = Math.min(nextAt, shelvedUntil);
    for (const telling of tellingsOf(person, lostFix, now)) {
      const { lostFixId, subject, occasion, key } = telling;
      const waiting = telling.rules.filter(
        ({ afterMinutes }) => afterMinutes > minutesOf(telling, toldMinutes),
      );
      const due = waiting.filter((rule) => isDue(telling, rule, now));
      nextAt = Math.min(
        nextAt,
        ...waiting.filter((rule) => !due.includes(rule)).map((rule) => dueAt(telling, rule)),
      );
      if (due.length === 0) continue;
      const minutes = Math.max(...due.map(({ afterMinutes }) => afterMinutes));
      const ways = noticeWays.filter((way) => due.some((rule) => rule.way === way));
      toldMinutes.set(key, minutes);
      notices.push({
        userId: person.userId,
        lostFixId,
        subject,
        occasion,
        dueKey: `${key} ${minutes}`,
        ways,
      });
    }
  }
  return { notices, nextAt: nextAt === Infinity ? null : nextAt };
}

/** A crew chief hears of the own crew only, and of a mount point while a lost fix of the crew hangs under it. */
function concerns(
  { role, crewId }: PolicyPerson,
  lostFix: PolicyLostFix,
  all: readonly PolicyLostFix[],
): boolean {
  if (role !== 'crewChief') return true;
  if (crewId === null) return false;
  if (lostFix.kind !== 'mountPoint') return lostFix.crewId === crewId;
  return all.some((one) => one.sharedId === lostFix.id && one.crewId === crewId && isOpen(one));
}

/** By due key without its minutes. A rule of fewer minutes than were told already adds nothing. */
function longestToldMinutes(told: ReadonlySet<string>): Map<string, number> {
  const longest = new Map<string, number>();
  for (const dueKey of told) {
    const at = dueKey.lastIndexOf(' ');
    const key = dueKey.slice(0, at);
    longest.set(key, Math.max(longest.get(key) ?? NOT_TOLD, Number(dueKey.slice(at + 1))));
  }
  return longest;
}

function minutesOf({ lostFixId, occasion, key }: Telling, told: ReadonlyMap<string, number>): number {
  const minutes = told.get(key) ?? NOT_TOLD;
  // Who heard of the chief's flag has heard of the loss that is raised a little later.
  const knowsByFlag = occasion.kind === 'raised' && told.has(flagKey(lostFixId));
  return knowsByFlag ? Math.max(minutes, 0) : minutes;
}
