import type { Role } from '@hubtack/contracts/auth/role.js';
import type { FlagWord, LostFixKind } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import type { NoticeRule, NoticeSubject } from '@hubtack/contracts/notices/notice.js';

export interface PolicyPerson {
  userId: number;
  role: Role;
  crewId: number | null;
  rules: readonly NoticeRule[];
}

/** What of a lost fix decides who is told of it, and when. Instants in ms UTC. */
export interface PolicyLostFix {
  id: number;
  kind: LostFixKind;
  crewId: number | null;
  raisedAt: number;
  endAt: number | null;
  closedAt: number | null;
  /** The mount point's lost fix that this one hangs under. */
  sharedId: number | null;
  flagAt: number | null;
  flagWord: FlagWord | null;
  shelvedUntil: number | null;
  /** When it last came back from the shelf. */
  backAt: number | null;
  isChattering: boolean;
  takenAt: number | null;
  takenByUserId: number | null;
  /** Every advice given on it. */
  advice: readonly { id: number; at: number }[];
}

/** Why something is told: raised, flagged by a chief, back from the shelf, or new advice. */
export type Occasion =
  { kind: 'raised' | 'flag' } | { kind: 'back'; at: number } | { kind: 'advice'; adviceId: number };

/** An occasion with the rules by which it is told. Their minutes count from `from`. */
export interface Telling {
  lostFixId: number;
  occasion: Occasion;
  /** The due key without its minutes. */
  key: string;
  subject: NoticeSubject;
  from: number;
  rules: readonly NoticeRule[];
}

const MINUTE_MS = 60_000;

export const isOpen = ({ endAt, closedAt }: PolicyLostFix): boolean => endAt === null && closedAt === null;
export const dueAt = ({ from }: Telling, { afterMinutes }: NoticeRule): number =>
  from + afterMinutes * MINUTE_MS;
/** The clock of a receiver or of a phone may be ahead of ours: what is there has happened. */
export const isDue = (telling: Telling, rule: NoticeRule, now: number): boolean =>
  rule.afterMinutes === 0 || dueAt(telling, rule) <= now;
export const flagKey = (lostFixId: number): string => `${lostFixId} flag`;

/**
 * What of a lost fix that is not closed is for one person, as it stands at `now`; nothing of what is held back. Flags come first: who was
 * told of one knows of the lost fix.
 */
export function tellingsOf(person: PolicyPerson, lostFix: PolicyLostFix, now: number): Telling[] {
  const advice = person.role === 'crewChief' ? adviceTellings(person, lostFix) : [];
  const looksWrong = lostFix.flagWord === 'fixLooksWrong';
  // No receiver reports that its fix is wrong: nothing but closing keeps such a flag back.
  if (isHeld(lostFix, now)) return looksWrong ? [...flagTellings(person.rules, lostFix), ...advice] : advice;
  const rules = person.rules.filter(({ way }) => way === 'mail' || !isInOtherHands(lostFix, person));
  const direct = [
    ...flagTellings(looksWrong ? person.rules : rules, lostFix),
    ...raisedTellings(rules, lostFix),
  ];
  const { shelvedUntil } = lostFix;
  const backAt = shelvedUntil ?? lostFix.backAt;
  if (backAt === null) return [...direct, ...advice];
  const later = direct.map((telling) => ({
    ...telling,
    rules: telling.rules.filter((rule) => dueAt(telling, rule) > backAt),
  }));
  return [...later, ...backTellings(lostFix, direct, backAt), ...advice];
}

const isHeld = (lostFix: PolicyLostFix, now: number): boolean =>
  !isOpen(lostFix) ||
  lostFix.sharedId !== null ||
  lostFix.isChattering ||
  (lostFix.shelvedUntil !== null && lostFix.shelvedUntil > now);

const isInOtherHands = ({ takenAt, takenByUserId }: PolicyLostFix, { userId }: PolicyPerson): boolean =>
  takenAt !== null && takenByUserId !== userId;

const of = (rules: readonly NoticeRule[], subject: NoticeSubject): NoticeRule[] =>
  rules.filter((rule) => rule.subject === subject);

function flagTellings(rules: readonly NoticeRule[], { id, flagAt }: PolicyLostFix): Telling[] {
  if (flagAt === null) return [];
  return [
    {
      lostFixId: id,
      occasion: { kind: 'flag' },
      key: flagKey(id),
      subject: 'flag',
      from: flagAt,
      rules: of(rules, 'flag'),
    },
  ];
}

function raisedTellings(rules: readonly NoticeRule[], { id, kind, raisedAt }: PolicyLostFix): Telling[] {
  if (kind === 'flag') return [];
  return [
    {
      lostFixId: id,
      occasion: { kind: 'raised' },
      // Not by its kind: sentences that come late may change that.
      key: `${id} raised`,
      subject: kind,
      from: raisedAt,
      rules: of(rules, kind),
    },
  ];
}

function adviceTellings({ rules }: PolicyPerson, { id, advice }: PolicyLostFix): Telling[] {
  return advice.map((one) => ({
    lostFixId: id,
    occasion: { kind: 'advice', adviceId: one.id },
    key: `${id} advice ${one.id}`,
    subject: 'advice',
    from: one.at,
    rules: of(rules, 'advice'),
  }));
}

/** Told once more, by every way that had come due before it came back. */
function backTellings(lostFix: PolicyLostFix, direct: readonly Telling[], backAt: number): Telling[] {
  const due = direct.flatMap((telling) => telling.rules.filter((rule) => dueAt(telling, rule) <= backAt));
  if (due.length === 0) return [];
  return [
    {
      lostFixId: lostFix.id,
      occasion: { kind: 'back', at: backAt },
      key: `${lostFix.id} back ${backAt}`,
      subject: lostFix.kind,
      from: backAt,
      rules: due.map((rule) => ({ ...rule, afterMinutes: 0 })),
    },
  ];
}
