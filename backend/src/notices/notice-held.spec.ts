import type { NoticeRule } from '@hubtack/contracts/notices/notice.js';
import { describe, expect, it } from 'vitest';
import type { PolicyLostFix } from './notice-tellings.js';
import { MIN, dispatcher, story, withRules } from './testing/story.js';

describe('a chattering rover', () => {
  it('is told of when it has come to rest and is still lost', () => {
    expect(
      story(dispatcher, [
        [0, { isChattering: true }],
        [5, {}],
        [10, {}],
      ]),
    ).toEqual(['5 5 lostFix board+sound', '10 5 lostFix mail']);
  });
});

describe('the shelf', () => {
  const shelf = { shelvedUntil: 20 * MIN };
  it('is silent, then told again once, by all ways that had come due', () => {
    expect(
      story(dispatcher, [
        [0, {}],
        [5, shelf],
        [10, shelf],
        [19.99, shelf],
        [20, shelf],
        [21, shelf],
      ]),
    ).toEqual(['0 5 lostFix board+sound', '20 5 lostFix board+sound+mail']);
  });
  it('says the same when the row has forgotten the shelf', () => {
    const back = { backAt: 20 * MIN };
    expect(
      story(dispatcher, [
        [0, {}],
        [5, shelf],
        [20, shelf],
        [21, back],
        [22, back],
      ]),
    ).toHaveLength(2);
    expect(
      story(dispatcher, [
        [0, {}],
        [5, shelf],
        [21, back],
        [22, back],
      ]),
    ).toHaveLength(2);
  });
  it('leaves what comes due after it alone', () => {
    const short = { shelvedUntil: 8 * MIN };
    expect(
      story(dispatcher, [
        [0, {}],
        [2, short],
        [8, short],
        [10, short],
        [11, short],
      ]),
    ).toEqual(['0 5 lostFix board+sound', '8 5 lostFix board+sound', '10 5 lostFix mail']);
  });
  it('says nothing of one that has ended on it', () => {
    expect(
      story(dispatcher, [
        [0, {}],
        [5, shelf],
        [20, { ...shelf, endAt: 1 }],
      ]),
    ).toHaveLength(1);
  });
  it('keeps a flag back until then, as part of that notice', () => {
    const flagged = { ...shelf, flagAt: 6 * MIN, flagWord: 'underCover' as const };
    expect(
      story(dispatcher, [
        [0, {}],
        [5, shelf],
        [6, flagged],
        [20, flagged],
        [21, flagged],
      ]),
    ).toEqual(['0 5 lostFix board+sound', '20 5 lostFix board+sound+mail']);
  });
});

describe('a flag', () => {
  const flag = { flagAt: 2 * MIN, flagWord: 'underCover' as const };
  it('is told once although the lost fix was told before', () => {
    expect(
      story(dispatcher, [
        [0, {}],
        [2, flag],
        [3, flag],
        [10, flag],
      ]),
    ).toEqual(['0 5 lostFix board+sound', '2 5 flag board+sound', '10 5 lostFix mail']);
  });
  it('that becomes known together with the loss is one notice with it', () => {
    expect(story(dispatcher, [[3, { ...flag, raisedAt: 3 * MIN }]])).toEqual(['3 5 flag board+sound']);
  });
  it('that comes first is the notice; the loss that is raised of it is no other', () => {
    const raised = { ...flag, raisedAt: 3 * MIN };
    expect(
      story(dispatcher, [
        [2, { ...flag, kind: 'flag' }],
        [3, raised],
        [13, raised],
      ]),
    ).toEqual(['2 5 flag board+sound', '13 5 lostFix mail']);
  });
  it.each([
    ['chatters', { isChattering: true }],
    ['hangs under a mount point', { sharedId: 9 }],
    ['has ended', { endAt: 1 }],
    ['is on the shelf', { shelvedUntil: 600 * MIN }],
    ['is in other hands', { takenAt: 1, takenByUserId: 7 }],
  ] as [string, Partial<PolicyLostFix>][])(
    '"fix looks wrong" is told although it %s; other flags are not',
    (_name, change) => {
      const told = new Set(['5 raised 10']);
      expect(story(dispatcher, [[2, { ...flag, ...change }]], new Set(told))).toEqual([]);
      const wrong = { ...flag, ...change, flagWord: 'fixLooksWrong' as const };
      expect(
        story(
          dispatcher,
          [
            [2, wrong],
            [3, wrong],
          ],
          told,
        ),
      ).toEqual(['2 5 flag board+sound']);
    },
  );
});

describe('one that is taken', () => {
  const rules: NoticeRule[] = [
    { subject: 'lostFix', way: 'board', afterMinutes: 0 },
    { subject: 'lostFix', way: 'speech', afterMinutes: 5 },
    { subject: 'lostFix', way: 'mail', afterMinutes: 5 },
  ];
  const taken = { takenAt: MIN, takenByUserId: 1 };
  const others = { ...withRules(dispatcher, ...rules), userId: 3 };
  it('is not told again to others, by mail still', () => {
    expect(
      story(others, [
        [0, {}],
        [1, taken],
        [5, taken],
      ]),
    ).toEqual(['0 5 lostFix board', '5 5 lostFix mail']);
  });
  it('is told to whoever has it', () => {
    expect(
      story(withRules(dispatcher, ...rules), [
        [0, {}],
        [5, taken],
      ]),
    ).toEqual(['0 5 lostFix board', '5 5 lostFix speech+mail']);
  });
});
