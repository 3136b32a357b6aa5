import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { HOLD_MS, partition, spansOf, splice, step, totalsOf, type TimedQuality } from './timeline.js';

const S = 1000;
const at = (...epochs: [seconds: number, quality: number][]): TimedQuality[] =>
  epochs.map(([seconds, quality]) => ({ time: seconds * S, quality }));
const LATER = 1_000_000 * S;

describe('worked example A of the design: holds, changes and silence', () => {
  const spans = spansOf(at([0, 4], [1, 4], [2, 5], [3, 5], [20, 4], [21, 4]));
  const parts = partition(spans, 0, 40 * S, LATER);

  it('gives the spans', () => {
    expect(parts.map(({ state, start, end }) => [state, start / S, end / S])).toEqual([
      ['fixed', 0, 2],
      ['float', 2, 13],
      ['silent', 13, 20],
      ['fixed', 20, 31],
      ['silent', 31, 40],
    ]);
  });
  it('gives the totals, which add up to the window', () => {
    expect(totalsOf(parts)).toEqual({
      fixedMs: 13 * S,
      floatMs: 11 * S,
      codeMs: 0,
      noneMs: 0,
      silentMs: 16 * S,
    });
  });
});

describe('the timeline', () => {
  it('maps every quality to its state', () => {
    const states = [0, 1, 2, 3, 4, 5, 6, 7, 8, 9].map((quality) => spansOf([{ time: 0, quality }])[0]!.state);
    expect(states).toEqual([
      'none',
      'code',
      'code',
      'code',
      'fixed',
      'float',
      'none',
      'none',
      'none',
      'code',
    ]);
  });
  it('an epoch exactly H later goes on without a gap; a millisecond more leaves one', () => {
    expect(spansOf(at([0, 4], [10, 4]))).toEqual([{ state: 'fixed', start: 0, end: 20 * S }]);
    expect(spansOf([...at([0, 4]), { time: 10 * S + 1, quality: 4 }])).toHaveLength(2);
  });
  it('the newest epoch holds until now at most', () => {
    const parts = partition(spansOf(at([0, 4])), 0, 20 * S, 4 * S);
    expect(parts.map(({ state, end }) => [state, end / S])).toEqual([
      ['fixed', 4],
      ['silent', 20],
    ]);
  });
  it('a window in which nothing was heard is silent, whole', () => {
    expect(partition([], 5, 9, LATER)).toEqual([{ state: 'silent', start: 5, end: 9 }]);
  });
  it('does not take epochs out of order: that is what splice is for', () => {
    expect(() => step({ state: 'fixed', start: 0, lastTime: 5 }, { time: 5, quality: 4 })).toThrow(
      RangeError,
    );
  });
});

const epochs = fc
  .uniqueArray(
    fc.record({ time: fc.integer({ min: 0, max: 120 * S }), quality: fc.constantFrom(0, 1, 4, 5) }),
    {
      selector: ({ time }) => time,
      minLength: 1,
      maxLength: 60,
    },
  )
  .map((list) => list.toSorted((a, b) => a.time - b.time));

describe('whatever comes in', () => {
  it('parts partition the window: no gap, no overlap, neighbours differ', () => {
    fc.assert(
      fc.property(
        epochs,
        fc.integer({ min: -20, max: 100 }),
        fc.integer({ min: 1, max: 200 }),
        (list, from, length) => {
          const [start, end] = [from * S, (from + length) * S];
          const parts = partition(spansOf(list), start, end, LATER);
          expect(parts[0]!.start).toBe(start);
          expect(parts.at(-1)!.end).toBe(end);
          for (const [index, part] of parts.entries()) {
            expect(part.end).toBeGreaterThan(part.start);
            if (index > 0) {
              expect(part.start).toBe(parts[index - 1]!.end);
              expect(part.state).not.toBe(parts[index - 1]!.state);
            }
          }
          expect(Object.values(totalsOf(parts)).reduce((a, b) => a + b)).toBe(end - start);
        },
      ),
    );
  });

  it('late epochs spliced in over [first, last + H) give the spans of all of them sorted', () => {
    fc.assert(
      fc.property(epochs, fc.array(fc.boolean(), { minLength: 60, maxLength: 60 }), (list, isLate) => {
        const newest = list.at(-1)!;
        const late = list.filter((epoch, index) => isLate[index] && epoch !== newest);
        if (late.length === 0) return;
        const inTime = list.filter((epoch) => !late.includes(epoch));
        const window = { start: late[0]!.time, end: late.at(-1)!.time + HOLD_MS };
        const inWindow = list.filter(({ time }) => time >= window.start && time < window.end);
        const within = spansOf(inWindow).map((span) => ({ ...span, end: Math.min(span.end, window.end) }));
        expect(splice(spansOf(inTime), window, within)).toEqual(spansOf(list));
      }),
      { numRuns: 1000 },
    );
  });
});
