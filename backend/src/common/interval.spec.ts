import fc from 'fast-check';
import { expect, it } from 'vitest';
import { intersect, subtract, totalMs, union, type Interval } from './interval.js';

const list = fc
  .array(fc.tuple(fc.integer({ min: 0, max: 60 }), fc.integer({ min: 0, max: 12 })), { maxLength: 8 })
  .map((pairs) => union(pairs.map(([start, length]) => ({ start, end: start + length }))));
const holds = (intervals: readonly Interval[], at: number) =>
  intervals.some(({ start, end }) => start <= at && at < end);

it('intersection, difference and union hold the instants they should, and times add up', () => {
  fc.assert(
    fc.property(list, list, (left, right) => {
      for (let at = 0; at < 80; at++) {
        const [inLeft, inRight] = [holds(left, at), holds(right, at)];
        expect(holds(intersect(left, right), at)).toBe(inLeft && inRight);
        expect(holds(subtract(left, right), at)).toBe(inLeft && !inRight);
        expect(holds(union([...left, ...right]), at)).toBe(inLeft || inRight);
      }
      expect(totalMs(intersect(left, right)) + totalMs(subtract(left, right))).toBe(totalMs(left));
    }),
  );
});
