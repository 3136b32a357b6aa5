import { defaultLimits } from '@hubtack/contracts/lost-fixes/limits.js';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { spansOf, type TimedQuality } from '../fixes/timeline.js';
import { detectorLimitsOf, episodesOf, type Episode } from './detector.js';
import { reconcile, type StoredEpisode } from './reconcile.js';

const S = 1000;
const episode = (start: number, end: number | null, kind: Episode['kind'] = 'lostFix'): Episode => ({
  kind,
  start: start * S,
  raisedAt: (start + 30) * S,
  end: end === null ? null : end * S,
  ending: end === null ? null : 'regained',
  pausedMs: 0,
});
const row = (
  id: number,
  start: number,
  end: number | null,
  more: Partial<StoredEpisode> = {},
): StoredEpisode => ({
  id,
  kind: 'lostFix',
  start: start * S,
  end: end === null ? null : end * S,
  isWithdrawn: false,
  ...more,
});

describe('which stored lost fix an episode is', () => {
  it('the open one that has ended', () => {
    const ended = episode(100, 200);
    expect(reconcile([row(1, 100, null)], [ended])).toEqual({
      insert: [],
      keep: [{ id: 1, episode: ended }],
      withdraw: [],
    });
  });
  it('one that late sentences split goes on as the longer part; the other is new', () => {
    const [first, second] = [episode(100, 140), episode(160, 400)];
    expect(reconcile([row(1, 100, 400)], [first, second])).toEqual({
      insert: [first],
      keep: [{ id: 1, episode: second }],
      withdraw: [],
    });
  });
  it('two that late sentences join go on as the longer; the other is withdrawn', () => {
    const joined = episode(100, 400);
    expect(reconcile([row(1, 100, 140), row(2, 160, 400)], [joined])).toEqual({
      insert: [],
      keep: [{ id: 2, episode: joined }],
      withdraw: [1],
    });
  });
  it('one that is gone is withdrawn once, and comes back as itself', () => {
    expect(reconcile([row(1, 100, 140)], []).withdraw).toEqual([1]);
    const withdrawn = row(1, 100, 140, { isWithdrawn: true });
    expect(reconcile([withdrawn], []).withdraw).toEqual([]);
    expect(reconcile([withdrawn], [episode(110, 150)]).keep).toMatchObject([{ id: 1 }]);
  });
  it('a kind does not turn into another while each has its own', () => {
    const [notHeard, noFirstFix] = [episode(0, 900, 'notHeard'), episode(900, 2000, 'noFirstFix')];
    const { keep } = reconcile(
      [row(1, 0, null, { kind: 'notHeard' }), row(2, 900, null, { kind: 'noFirstFix' })],
      [notHeard, noFirstFix],
    );
    expect(keep.toSorted((a, b) => a.id - b.id)).toEqual([
      { id: 1, episode: notHeard },
      { id: 2, episode: noFirstFix },
    ]);
  });
  it('a flag made while the fix was being lost becomes that lost fix; one of an hour before does not', () => {
    const lost = episode(100, null);
    expect(reconcile([row(1, 110, null, { kind: 'flag' })], [lost]).keep).toMatchObject([{ id: 1 }]);
    expect(reconcile([row(1, 90, null, { kind: 'flag' })], [lost]).keep).toMatchObject([{ id: 1 }]);
    const hourLater = episode(3700, null);
    expect(reconcile([row(1, 100, null, { kind: 'flag' })], [hourLater])).toMatchObject({
      insert: [hourLater],
      withdraw: [],
    });
  });
});

describe('whatever the order of arrival', () => {
  const limits = detectorLimitsOf(defaultLimits);
  const duty = { end: 3600 * S, onShift: [{ start: 0, end: 3600 * S }] };
  const epochs = fc.uniqueArray(
    fc.record({
      time: fc.integer({ min: 0, max: 400 }).map((time) => time * 5 * S),
      quality: fc.constantFrom(4, 4, 4, 5, 1, 0),
    }),
    { selector: ({ time }) => time, minLength: 1, maxLength: 200 },
  );
  const sorted = (list: readonly TimedQuality[]) => list.toSorted((a, b) => a.time - b.time);

  it('lost fixes kept live equal those worked out afterwards from all spans', () => {
    fc.assert(
      fc.property(
        epochs.chain((list) =>
          fc.tuple(fc.shuffledSubarray(list, { minLength: list.length }), fc.integer({ min: 1, max: 40 })),
        ),
        ([arrival, group]) => {
          const rows = new Map<number, Episode | null>();
          let nextId = 1;
          const heard: TimedQuality[] = [];
          const look = (now: number) => {
            const stored = [...rows].map(([id, known]): StoredEpisode => {
              const { kind, start, end } = known ?? episode(0, 0);
              return { id, kind, start, end, isWithdrawn: known === null };
            });
            const result = reconcile(stored, episodesOf(spansOf(sorted(heard)), duty, now, limits));
            for (const { id, episode: kept } of result.keep) rows.set(id, kept);
            for (const id of result.withdraw) rows.set(id, null);
            for (const added of result.insert) rows.set(nextId++, added);
          };
          for (let from = 0; from < arrival.length; from += group) {
            heard.push(...arrival.slice(from, from + group));
            look(Math.max(...heard.map(({ time }) => time)) + 5 * S);
          }
          look(4000 * S);
          const live = [...rows.values()].filter((known) => known !== null);
          expect(live.toSorted((a, b) => a.start - b.start)).toEqual(
            episodesOf(spansOf(sorted(arrival)), duty, 4000 * S, limits),
          );
        },
      ),
      { numRuns: 300 },
    );
  });
});
