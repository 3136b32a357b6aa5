import { expect, it } from 'vitest';
import { noticeTimes } from './notice-day.js';
import type { PolicyLostFix } from './notice-tellings.js';
import { MIN, dispatcher, lostFix, withRules } from './testing/story.js';

const day = (id: number, raised: number, change: Partial<PolicyLostFix> = {}) =>
  lostFix({ id, crewId: id, raisedAt: raised * MIN, ...change });
const told = (lostFixes: PolicyLostFix[]) =>
  noticeTimes(dispatcher, lostFixes).map(({ at, lostFixId, subject, ways }) =>
    [at / MIN, lostFixId, subject, ...ways].join(' '),
  );

it('a day is told as it went: ended in time, taken in between, flagged, a base station under twelve crews', () => {
  const members = Array.from({ length: 12 }, (_, index) =>
    day(20 + index, index === 0 ? 99.5 : 100.5, { sharedId: 50, endAt: 160 * MIN }),
  );
  const lostFixes = [
    day(1, 0, { endAt: 4 * MIN }),
    day(2, 5, { endAt: 30 * MIN, closedAt: 31 * MIN }),
    day(3, 20, { takenAt: 21 * MIN, takenByUserId: 8, endAt: 40 * MIN }),
    day(4, 60, { flagAt: 59.5 * MIN, flagWord: 'underCover', endAt: 61 * MIN }),
    day(50, 100, { kind: 'mountPoint', crewId: null, endAt: 160 * MIN }),
    ...members,
  ];
  expect(told(lostFixes)).toEqual([
    '0 1 lostFix board sound',
    '5 2 lostFix board sound',
    '15 2 lostFix mail',
    '20 3 lostFix board sound',
    '30 3 lostFix mail',
    '59.5 4 flag board sound',
    '99.5 20 lostFix board sound',
    '100 50 mountPoint board sound mail',
  ]);
});

it('a flag before the loss was raised is no lost fix yet to who hears of no flags', () => {
  const person = withRules(dispatcher, { subject: 'lostFix', way: 'board', afterMinutes: 0 });
  const flagged = day(1, 2, { flagAt: MIN, flagWord: 'underCover' });
  expect(noticeTimes(person, [flagged]).map(({ at }) => at / MIN)).toEqual([2]);
});
