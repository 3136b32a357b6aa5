import { defaultNoticeRules, type NoticeRule } from '@hubtack/contracts/notices/notice.js';
import { dueNotices } from '../notice-policy.js';
import type { PolicyLostFix, PolicyPerson } from '../notice-tellings.js';

export const MIN = 60_000;
export const dispatcher: PolicyPerson = {
  userId: 1,
  role: 'dispatcher',
  crewId: null,
  rules: defaultNoticeRules.dispatcher,
};
export const chief: PolicyPerson = {
  userId: 2,
  role: 'crewChief',
  crewId: 10,
  rules: defaultNoticeRules.crewChief,
};
export const withRules = (person: PolicyPerson, ...rules: NoticeRule[]): PolicyPerson => ({
  ...person,
  rules,
});

export const lostFix = (change: Partial<PolicyLostFix> = {}): PolicyLostFix => ({
  id: 5,
  kind: 'lostFix',
  crewId: 10,
  raisedAt: 0,
  endAt: null,
  closedAt: null,
  sharedId: null,
  flagAt: null,
  flagWord: null,
  shelvedUntil: null,
  backAt: null,
  isChattering: false,
  takenAt: null,
  takenByUserId: null,
  advice: [],
  ...change,
});
export const mountPoint = (change: Partial<PolicyLostFix> = {}) =>
  lostFix({ id: 9, kind: 'mountPoint', crewId: null, ...change });

/** What is told as the minutes go by: `minute subject ways`. */
export function story(
  person: PolicyPerson,
  steps: [minute: number, ...lostFixes: Partial<PolicyLostFix>[]][],
  told = new Set<string>(),
): string[] {
  return steps.flatMap(([minute, ...changes]) => {
    const standing = changes.map((change) => lostFix(change));
    return dueNotices(person, standing, told, minute * MIN).notices.map(
      ({ subject, ways, dueKey, lostFixId }) => {
        if (told.has(dueKey)) throw new Error(`${dueKey} is told twice`);
        told.add(dueKey);
        return `${minute} ${lostFixId} ${subject} ${ways.join('+')}`;
      },
    );
  });
}
