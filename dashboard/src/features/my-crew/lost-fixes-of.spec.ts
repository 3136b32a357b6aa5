import { expect, it } from 'vitest';
import { makeLostFix as lostFix } from '../../testing/make-lost-fix';
import { lostFixesOf } from './lost-fixes-of';

const advice = { at: 150, by: 'Dispatcher', text: 'Switch to QUARB2' };

it('an open one is as the stream has it, others as the day has them, newest first', () => {
  const ofDay = [lostFix({ startAt: 100 }), lostFix({ id: 2, startAt: 200 })];
  const both = lostFixesOf(ofDay, [lostFix({ id: 2, startAt: 200, advice })], 1);
  expect(both.map(({ id }) => id)).toEqual([2, 1]);
  expect(both[0]!.advice).toEqual(advice);
});
it('one that the day does not have yet is there; those of other crews are not', () => {
  const open = [lostFix({ id: 3 }), lostFix({ id: 4, crewId: 2 })];
  expect(lostFixesOf([], open, 1).map(({ id }) => id)).toEqual([3]);
});
it('the mount point\u2019s that an own one hangs under comes with it', () => {
  const open = [
    lostFix({ id: 3, sharedId: 9 }),
    lostFix({ id: 9, crewId: null }),
    lostFix({ id: 8, crewId: null }),
  ];
  expect(lostFixesOf([], open, 1).map(({ id }) => id)).toEqual([3, 9]);
});
