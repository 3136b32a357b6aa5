import { defaultLimits } from '@hubtack/contracts/lost-fixes/limits.js';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { subtract, totalMs, type Interval } from '../common/interval.js';
import { spansOf, type HeardSpan } from '../fixes/timeline.js';
import { detectorLimitsOf, episodesOf, type DutyTime } from './detector.js';

const S = 1000;
const MIN = 60 * S;
const limits = detectorLimitsOf(defaultLimits);

type Word = 'fixed' | 'float' | 'code' | 'none' | 'silent';
/** `['fixed', 100], ['float', 140]`: each state until that second. */
function spans(...until: [Word, number][]): HeardSpan[] {
  let start = 0;
  const list: HeardSpan[] = [];
  for (const [state, end] of until) {
    if (state !== 'silent') list.push({ state, start: start * S, end: end * S });
    start = end;
  }
  return list;
}
const openShift = (from = 0): DutyTime => ({ end: null, onShift: [{ start: from * S, end: 1e12 }] });
const shift = (end: number, pauses: Interval[] = []): DutyTime => ({
  end: end * S,
  onShift: subtract([{ start: 0, end: end * S }], pauses),
});
const pause = (start: number, end: number): Interval => ({ start: start * S, end: end * S });
const at = (list: HeardSpan[], now: number, duty: DutyTime = openShift()) =>
  episodesOf(list, duty, now * S, limits).map(({ kind, start, raisedAt, end, ending, pausedMs }) => [
    kind,
    start / S,
    raisedAt / S,
    end === null ? null : end / S,
    ...(ending ? [ending] : []),
    ...(pausedMs ? [pausedMs / S] : []),
  ]);

describe('a lost fix', () => {
  it('worked example E: start 100, raised at 130, end 140, known at 155', () => {
    const list = spans(['fixed', 100], ['float', 118], ['fixed', 126], ['float', 140], ['fixed', 1000]);
    expect(at(list, 130)).toEqual([]);
    expect(at(list, 130.001)).toEqual([['lostFix', 100, 130, null]]);
    expect(at(list, 154.999)).toEqual([['lostFix', 100, 130, null]]);
    expect(at(list, 155)).toEqual([['lostFix', 100, 130, 140, 'regained']]);
  });
  it('worked example F: a gap of 28 s is none, at 130 as at 143', () => {
    const list = spans(['fixed', 100], ['float', 128], ['fixed', 1000]);
    for (const now of [129, 130, 131, 142, 143, 200]) expect(at(list, now)).toEqual([]);
  });
  it('worked example G: raised late at 133, start 100, end 200', () => {
    const list = spans(['fixed', 100], ['float', 125], ['fixed', 133], ['float', 200], ['fixed', 1000]);
    expect(at(list, 132)).toEqual([]);
    expect(at(list, 134)).toEqual([['lostFix', 100, 133, null]]);
    expect(at(list, 300)).toEqual([['lostFix', 100, 133, 200, 'regained']]);
  });
  it('of exactly 30 s counts: it is at least that long', () => {
    const list = spans(['fixed', 100], ['float', 130], ['fixed', 1000]);
    expect(at(list, 131)).toEqual([]);
    expect(at(list, 145)).toEqual([['lostFix', 100, 130, 130, 'regained']]);
    expect(at(spans(['fixed', 100], ['float', 129.999], ['fixed', 1000]), 145)).toEqual([]);
  });
  it('counts silence as not fixed, and starts where the hold time ends', () => {
    const list = spansOf([0, 1, 2, 3, 4, 5, 10, 15, 20].map((time) => ({ time: time * S, quality: 4 })));
    expect(at(list, 59)).toEqual([]);
    expect(at(list, 61)).toEqual([['lostFix', 30, 60, null]]);
  });
  it('ends with the shift', () => {
    const list = spans(['fixed', 100], ['float', 1000]);
    expect(at(list, 400, shift(300))).toEqual([['lostFix', 100, 130, 300, 'shiftEnd']]);
    expect(at(list, 400, shift(120))).toEqual([]);
    expect(at(list, 200, shift(300))).toEqual([['lostFix', 100, 130, null]]);
  });
  it('a pause suspends it, and its minutes are taken off', () => {
    const list = spans(['fixed', 100], ['float', 5000]);
    const paused = shift(4000, [pause(110, 1910)]);
    expect(at(list, 1800, paused)).toEqual([]);
    expect(at(list, 1929, paused)).toEqual([]);
    expect(at(list, 1931, paused)).toEqual([['lostFix', 100, 1930, null, 1800]]);
  });
  it('switched off for lunch and fixed again before it ends is none', () => {
    const list = spans(['fixed', 100], ['silent', 1800], ['float', 1850], ['fixed', 3000]);
    expect(at(list, 2500, shift(3000, [pause(100, 1890)]))).toEqual([]);
    expect(at(list, 2500, shift(3000, [pause(100, 1810)]))).toEqual([
      ['lostFix', 1810, 1840, 1850, 'regained'],
    ]);
  });
});

describe('no first fix, not heard', () => {
  it('no first fix five minutes after the first report, from that report on', () => {
    const list = spans(['silent', 60], ['float', 500], ['fixed', 600]);
    expect(at(list, 360)).toEqual([]);
    expect(at(list, 361)).toEqual([['noFirstFix', 60, 360, null]]);
    expect(at(list, 515)).toEqual([['noFirstFix', 60, 360, 500, 'regained']]);
  });
  it('a short fixed run is no first fix; what came before the shift does not count', () => {
    const list = spans(['float', 50], ['fixed', 60], ['float', 1000]);
    expect(at(list, 400)).toEqual([['noFirstFix', 0, 300, null]]);
    const before = spans(['fixed', 100], ['float', 1000]);
    expect(at(before, 450, openShift(100))).toEqual([['noFirstFix', 100, 400, null]]);
  });
  it('not heard ten minutes after the shift began; the report that comes ends it', () => {
    expect(at([], 600)).toEqual([]);
    expect(at([], 601)).toEqual([['notHeard', 0, 600, null]]);
    const list = spans(['silent', 900], ['float', 930], ['fixed', 2000]);
    expect(at(list, 901)).toEqual([['notHeard', 0, 600, 900, 'regained']]);
    expect(at(list, 1000)).toEqual([['notHeard', 0, 600, 900, 'regained']]);
  });
  it('nothing before the shift begins, nor in a pause', () => {
    expect(at([], 500, openShift(1000))).toEqual([]);
    expect(at([], 5000, shift(9000, [pause(300, 5000)]))).toEqual([]);
    expect(at([], 5301, shift(9000, [pause(300, 5000)]))).toEqual([['notHeard', 0, 5300, null, 4700]]);
  });
});

// Every state before the change against every state after it: what a loss of 40 s and of 20 s makes of it.
const words: Word[] = ['fixed', 'float', 'code', 'none', 'silent'];
const table = words.flatMap((before) => words.map((after) => [before, after] as const));
describe.each(table)('from %s to %s', (before, after) => {
  const hasLost = before === 'fixed' && after !== 'fixed';
  it('40 s long', () => {
    const list = spans(['fixed', 100], [before, 200], [after, 240], ['fixed', 600]);
    const start = before === 'fixed' ? 200 : 100;
    const expected =
      before === 'fixed' && after === 'fixed'
        ? []
        : [['lostFix', start, start + 30, after === 'fixed' ? 200 : 240, 'regained']];
    expect(at(list, 600)).toEqual(expected);
  });
  it('20 s long', () => {
    const list = spans(['fixed', 200], [before, 400], [after, 420], ['fixed', 600]);
    const lost = before !== 'fixed' ? [['lostFix', 200, 230, after === 'fixed' ? 400 : 420, 'regained']] : [];
    expect(at(list, 600)).toEqual(hasLost ? [] : lost);
  });
});

describe('whatever the timeline', () => {
  const timeline = fc
    .array(fc.tuple(fc.constantFrom(...words), fc.integer({ min: 1, max: 120 })), { maxLength: 40 })
    .map((list) => {
      let end = 0;
      return spans(...list.map(([state, length]) => [state, (end += length)] as [Word, number]));
    });
  const pauses = fc
    .array(fc.tuple(fc.integer({ min: 0, max: 1500 }), fc.integer({ min: 1, max: 300 })), { maxLength: 3 })
    .map((list) => list.map(([start, length]) => pause(start, start + length)));

  it('episodes come in order, do not overlap, are at least as long as their limit, and are raised within', () => {
    fc.assert(
      fc.property(timeline, pauses, fc.integer({ min: 0, max: 3000 }), (list, off, now) => {
        const duty = shift(
          2000,
          off.toSorted((a, b) => a.start - b.start),
        );
        const episodes = episodesOf(list, duty, now * S, limits);
        for (const [index, episode] of episodes.entries()) {
          const until = episode.end ?? Math.min(now, 2000) * S;
          const paid = until - episode.start - episode.pausedMs;
          const least = { lostFix: 30 * S, noFirstFix: 5 * MIN, notHeard: 10 * MIN }[episode.kind];
          expect(paid).toBeGreaterThanOrEqual(least);
          expect(episode.raisedAt).toBeGreaterThanOrEqual(episode.start + least);
          expect(episode.raisedAt).toBeLessThanOrEqual(until);
          if (index > 0) expect(episode.start).toBeGreaterThanOrEqual(episodes[index - 1]!.end!);
        }
        const open = episodes.filter(({ end }) => end === null);
        expect(open.length).toBeLessThanOrEqual(now < 2000 ? 1 : 0);
      }),
    );
  });

  it('what was open a moment ago is open still, or has ended: no episode goes without a sentence', () => {
    fc.assert(
      fc.property(timeline, fc.integer({ min: 1, max: 3000 }), (list, now) => {
        const heard = list.filter(({ start }) => start < now * S);
        const before = episodesOf(heard, shift(2000), now * S, limits);
        const after = episodesOf(heard, shift(2000), (now + 1) * S, limits);
        for (const { kind, start, raisedAt } of before)
          expect(after.map((episode) => [episode.kind, episode.start, episode.raisedAt])).toContainEqual([
            kind,
            start,
            raisedAt,
          ]);
      }),
    );
  });
  it('total on-shift time is never exceeded', () => {
    fc.assert(
      fc.property(timeline, (list) => {
        const sum = episodesOf(list, shift(2000), 3000 * S, limits).reduce(
          (total, { start, end, pausedMs }) => total + end! - start - pausedMs,
          0,
        );
        expect(sum).toBeLessThanOrEqual(totalMs(shift(2000).onShift));
      }),
    );
  });
});
