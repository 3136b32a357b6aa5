import { mergeLostFixes } from '../../lib/lost-fixes';
import { makeLostFix } from '../../testing/make-lost-fix';
import { describe, expect, it } from 'vitest';
import { byNeed, deskGroups, lengthMs } from './order';

const flag = (word: 'fixLooksWrong' | 'underCover') => ({ at: 1, word, note: null, by: 'Chief' });

describe('the desk', () => {
  it('a fix that looks wrong first, then flags, then the mount point, then losses; the longest first', () => {
    const list = [
      makeLostFix({ id: 1, kind: 'notHeard', startAt: 1 }),
      makeLostFix({ id: 2, startAt: 50 }),
      makeLostFix({ id: 3, startAt: 20 }),
      makeLostFix({ id: 4, kind: 'mountPoint', startAt: 60 }),
      makeLostFix({ id: 5, flag: flag('underCover'), startAt: 90 }),
      makeLostFix({ id: 6, kind: 'flag', flag: flag('fixLooksWrong'), startAt: 95 }),
      makeLostFix({ id: 7, startAt: 0, shelved: { until: 9, by: 'x', reason: 'y' } }),
    ];
    expect(list.toSorted(byNeed).map(({ id }) => id)).toEqual([6, 5, 4, 3, 2, 1, 7]);
  });
  it('in groups, with what hangs under a mount point’s lost fix shown under it only', () => {
    const groups = deskGroups([
      makeLostFix({ id: 1, kind: 'mountPoint', status: 'taken' }),
      makeLostFix({ id: 2, sharedId: 1 }),
      makeLostFix({ id: 3, sharedId: 99 }),
      makeLostFix({ id: 4, status: 'ended', endAt: 200_000 }),
    ]);
    expect(groups.map(({ name, lostFixes }) => [name, lostFixes.map(({ id }) => id)])).toEqual([
      ['Open', [3]],
      ['Taken', [1]],
      ['Ended, to be closed', [4]],
    ]);
  });
  it('pauses are taken off its length', () => {
    expect(lengthMs(makeLostFix({ startAt: 100, endAt: 500, pausedMs: 300 }), 900)).toBe(100);
    expect(lengthMs(makeLostFix({ startAt: 100 }), 900)).toBe(800);
  });
});

describe('what the stream brings', () => {
  const active = (one: { status: string }) => one.status !== 'closed';
  it('replaces, is added in front, and leaves when it does not belong any more', () => {
    const list = [makeLostFix({ id: 2 }), makeLostFix({ id: 1 })];
    const changed = [makeLostFix({ id: 1, status: 'taken' }), makeLostFix({ id: 3 })];
    expect(mergeLostFixes(list, changed, active).map(({ id, status }) => [id, status])).toEqual([
      [3, 'open'],
      [2, 'open'],
      [1, 'taken'],
    ]);
    expect(mergeLostFixes(list, [makeLostFix({ id: 2, status: 'closed' })], active)).toEqual([list[1]]);
    const twice = [makeLostFix({ id: 9 }), makeLostFix({ id: 9, photos: 1 })];
    expect(mergeLostFixes([], twice, active)).toEqual([twice[1]]);
  });
});
