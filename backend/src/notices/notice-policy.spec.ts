import { defaultNoticeRules } from '@hubtack/contracts/notices/notice.js';
import { describe, expect, it } from 'vitest';
import { dueNotices } from './notice-policy.js';
import type { PolicyLostFix } from './notice-tellings.js';
import { MIN, chief, dispatcher, lostFix, mountPoint, story, withRules } from './testing/story.js';

describe('a lost fix', () => {
  it.each([
    [
      'at once by the board and aloud, by mail when it lasts ten minutes',
      {},
      ['0 5 lostFix board+sound', '10 5 lostFix mail'],
    ],
    ['no mail when it has ended by then', { endAt: 9 * MIN }, ['0 5 lostFix board+sound']],
    ['no mail when somebody has closed it', { closedAt: 9 * MIN }, ['0 5 lostFix board+sound']],
    [
      'mail although somebody has taken it',
      { takenAt: 9 * MIN, takenByUserId: 7 },
      ['0 5 lostFix board+sound', '10 5 lostFix mail'],
    ],
  ] as [string, Partial<PolicyLostFix>, string[]][])('%s', (_name, later, expected) => {
    expect(
      story(dispatcher, [
        [0, {}],
        [1, {}],
        [9.99, {}],
        [10, later],
        [11, later],
        [500, later],
      ]),
    ).toEqual(expected);
  });

  it.each([
    ['that has ended', { endAt: 1 }],
    ['that is withdrawn', { endAt: 0 }],
    ['that is closed', { closedAt: 1 }],
    ['of a mount point that is down', { sharedId: 9 }],
    ['of a rover that chatters', { isChattering: true }],
    ['on the shelf', { shelvedUntil: 600 * MIN }],
  ] as [string, Partial<PolicyLostFix>][])('none %s', (_name, change) => {
    expect(
      story(dispatcher, [
        [0, change],
        [10, change],
        [500, change],
      ]),
    ).toEqual([]);
  });

  it('is told by all ways in one when it becomes known late', () => {
    expect(
      story(dispatcher, [
        [30, {}],
        [31, {}],
      ]),
    ).toEqual(['30 5 lostFix board+sound+mail']);
  });
  it('is told at once although its rover\u2019s clock is ahead of ours', () => {
    expect(story(dispatcher, [[0, { raisedAt: 3000 }]])).toEqual(['0 5 lostFix board+sound']);
  });
  it('is told once although late sentences make another kind of it', () => {
    expect(
      story(dispatcher, [
        [0, { kind: 'noFirstFix' }],
        [1, { kind: 'lostFix' }],
      ]),
    ).toHaveLength(1);
  });
  it.each(['noFirstFix', 'notHeard', 'mountPoint'] as const)(
    'of kind %s is told by its own rules',
    (kind) => {
      const person = withRules(dispatcher, { subject: kind, way: 'speech', afterMinutes: 2 });
      expect(
        story(person, [
          [0, {}, { kind }],
          [1, { kind }],
          [2, { kind }],
        ]),
      ).toEqual([`2 5 ${kind} speech`]);
    },
  );
  it('waits for the next rule only as long as there is one', () => {
    const next = (told: string[], change: Partial<PolicyLostFix> = {}) =>
      dueNotices(dispatcher, [lostFix(change)], new Set(told), 1).nextAt;
    expect(next([])).toBe(10 * MIN);
    expect(next(['5 raised 10'])).toBeNull();
    expect(next([], { shelvedUntil: 700 })).toBe(700);
    expect(next([], { endAt: 1 })).toBeNull();
  });
  it('a rule of fewer minutes, made after it was told, adds nothing', () => {
    const person = withRules(dispatcher, { subject: 'lostFix', way: 'speech', afterMinutes: 5 });
    expect(story(person, [[20, {}]], new Set(['5 raised 10']))).toEqual([]);
  });
});

describe('a mount point', () => {
  it('is one notice; those that hang under it are none, raised before or after', () => {
    expect(
      story(dispatcher, [
        [0, { id: 1 }],
        [
          1,
          { id: 1, sharedId: 9 },
          mountPoint({ raisedAt: MIN }),
          { id: 2, sharedId: 9 },
          { id: 3, sharedId: 9 },
        ],
        [30, { id: 1, sharedId: 9 }, { id: 4, sharedId: 9 }],
      ]),
    ).toEqual(['0 1 lostFix board+sound', '1 9 mountPoint board+sound+mail']);
  });
  it('is told to a chief, who asks for it, only while the crew\u2019s own hangs under it', () => {
    const person = withRules(chief, { subject: 'mountPoint', way: 'board', afterMinutes: 0 });
    const theirs = { id: 1, sharedId: 9, crewId: 11 };
    expect(
      story(person, [
        [0, mountPoint(), theirs],
        [1, mountPoint(), { ...theirs, crewId: 10, endAt: 1 }],
      ]),
    ).toEqual([]);
    expect(story(person, [[0, mountPoint(), theirs, { id: 2, sharedId: 9 }]])).toEqual([
      '0 9 mountPoint board',
    ]);
  });
});

describe('advice', () => {
  const first = { advice: [{ id: 70, at: MIN }] };
  const both = {
    advice: [
      { id: 70, at: MIN },
      { id: 71, at: 4 * MIN },
    ],
  };
  it('is told to the chief, each once, whatever else is held back', () => {
    const held = { sharedId: 9, isChattering: true, endAt: 1, takenAt: 1, takenByUserId: 1 };
    expect(
      story(chief, [
        [0, {}],
        [1, first],
        [2, first],
        [4, { ...both, ...held }],
        [5, both],
      ]),
    ).toEqual(['1 5 advice board+sound', '4 5 advice board+sound']);
  });
  it('on a mount point reaches the chiefs whose own hangs under it, and no other', () => {
    const steps: Parameters<typeof story>[1] = [[1, mountPoint(first), { id: 1, sharedId: 9, crewId: 10 }]];
    expect(story(chief, steps)).toEqual(['1 9 advice board+sound']);
    expect(story({ ...chief, crewId: 11 }, steps)).toEqual([]);
  });
  it('is for chiefs alone', () => {
    const person = withRules(dispatcher, { subject: 'advice', way: 'board', afterMinutes: 0 });
    expect(story(person, [[1, first]])).toEqual([]);
  });
});

it('a chief hears of no other crew, whatever the rules; without a crew of nothing', () => {
  const all = withRules(chief, ...defaultNoticeRules.dispatcher, ...defaultNoticeRules.crewChief);
  const foreign = { crewId: 11, flagAt: 0, flagWord: 'fixLooksWrong' as const, advice: [{ id: 1, at: 0 }] };
  expect(story(all, [[30, foreign, mountPoint()]])).toEqual([]);
  expect(story({ ...all, crewId: null }, [[30, { ...foreign, crewId: null }, mountPoint()]])).toEqual([]);
  expect(story(all, [[30, {}]])).toEqual(['30 5 lostFix board+sound+mail']);
});
