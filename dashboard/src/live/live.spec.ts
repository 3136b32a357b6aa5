import { wholeOf } from '@hubtack/contracts/fixes/totals.js';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { makeLane } from '../testing/make-lane';
import { makeLostFix } from '../testing/make-lost-fix';
import { Batcher } from './batcher';
import { applyEvents, boardStateOf } from './board-state';
import { stateNow, totalsNow } from './lane-figures';
import { freshnessOf } from './stream-status';

const event = { serverTime: 5000, changes: [], lanes: [], gone: [] };
const { ribbon: _ribbon, ...change } = makeLane({ id: 1, state: 'float', since: 900 });

describe('events on the board', () => {
  const before = boardStateOf(
    {
      cursor: 'x.1',
      serverTime: 4000,
      lanes: [makeLane({ id: 1 }), makeLane({ id: 2 })],
      lostFixes: [makeLostFix({ id: 5 })],
    },
    1000,
  );

  it('a change merges, and keeps the ribbon when it brings none', () => {
    const after = applyEvents(before, [{ ...event, changes: [change] }], 1000);
    expect(after.lanes.get(1)).toMatchObject({ state: 'float', crewName: 'Alder' });
    expect(after.lanes.get(1)!.ribbon).toBe(before.lanes.get(1)!.ribbon);
  });
  it('lanes that did not change stay the same objects', () => {
    const after = applyEvents(before, [{ ...event, changes: [change] }], 1000);
    expect(after.lanes.get(2)).toBe(before.lanes.get(2));
    expect(before.lanes.get(1)!.state).toBe('fixed');
  });
  it('whole lanes replace, gone lanes leave, a change to nobody is passed over', () => {
    const after = applyEvents(
      before,
      [
        {
          ...event,
          lanes: [makeLane({ id: 3, crewName: 'Echidna' })],
          gone: [2],
          changes: [{ ...change, id: 99 }],
        },
      ],
      1000,
    );
    expect([...after.lanes.keys()]).toEqual([1, 3]);
    expect(after.clockOffsetMs).toBe(4000);
  });
});

describe('lost fixes on the board', () => {
  const before = boardStateOf(
    { cursor: 'x.1', serverTime: 0, lanes: [], lostFixes: [makeLostFix({ id: 5 })] },
    0,
  );
  const after = (change: Partial<Parameters<typeof makeLostFix>[0]>) => [
    ...applyEvents(before, [{ serverTime: 0, lostFixes: [makeLostFix(change)] }], 0).lostFixes.keys(),
  ];
  it('come, and go when they have ended or are closed', () => {
    expect(after({ id: 6 })).toEqual([5, 6]);
    expect(after({ id: 5, endAt: 9 })).toEqual([]);
    expect(after({ id: 5, closed: { at: 9, by: 'x', cause: 'planned', note: null } })).toEqual([]);
  });
});

describe('figures go on by the clock', () => {
  const lane = makeLane();
  it('the state grows until it is held no longer, then silence does; they add up to on-shift time', () => {
    expect(totalsNow(lane, 1_005_000)).toMatchObject({ fixedMs: 905_000, silentMs: 0 });
    expect(totalsNow(lane, 1_030_000)).toMatchObject({ fixedMs: 910_000, silentMs: 20_000 });
    for (const now of [1_000_000, 1_004_321, 1_099_999]) expect(wholeOf(totalsNow(lane, now))).toBe(now);
  });
  it('nothing grows on a break or off shift', () => {
    for (const duty of ['paused', 'offShift'] as const)
      expect(totalsNow({ ...lane, duty }, 1_030_000)).toEqual(lane.today);
  });
  it('a rover is silent from where its newest epoch holds no longer', () => {
    expect(stateNow(lane, 1_009_999).state).toBe('fixed');
    expect(stateNow(lane, 1_010_000)).toEqual({ state: 'silent', since: 1_010_000 });
  });
});

describe('the batcher', () => {
  beforeEach(() => {
    vi.useFakeTimers();
  });
  afterEach(() => {
    vi.useRealTimers();
  });
  it('hands on together what came within the interval, in order, once', () => {
    const batches: number[][] = [];
    const batcher = new Batcher<number>(250, (batch) => batches.push(batch));
    batcher.push(1);
    batcher.push(2);
    expect(batches).toEqual([]);
    vi.advanceTimersByTime(250);
    batcher.push(3);
    vi.advanceTimersByTime(1000);
    expect(batches).toEqual([[1, 2], [3]]);
  });
});

describe('how fresh the page is', () => {
  it.each([
    [{ lastHeardAt: null, cutSince: null }, 'connecting'],
    [{ lastHeardAt: 95_000, cutSince: null }, 'live'],
    [{ lastHeardAt: 80_000, cutSince: null }, 'delayed'],
    [{ lastHeardAt: 95_000, cutSince: 98_000 }, 'live'],
    [{ lastHeardAt: 90_000, cutSince: 90_000 }, 'cut'],
  ] as const)('%o is %s', (status, kind) => {
    expect(freshnessOf(status, 100_000).kind).toBe(kind);
  });
});
