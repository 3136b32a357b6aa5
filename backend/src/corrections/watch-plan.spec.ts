import { describe, expect, it } from 'vitest';
import { isDue, type WatchedSource } from './watch-plan.js';

const MINUTE = 60_000;
const source = (change: Partial<WatchedSource> = {}): WatchedSource => ({
  id: 1,
  watchMinutes: 15,
  isRefused: false,
  isDown: false,
  last: null,
  ...change,
});
/** Minutes of a day at which a source is looked at, when every look ends as `saysDown` says. */
function looks(change: Partial<WatchedSource>, saysDown = false, minutes = 24 * 60): number[] {
  const found: number[] = [];
  let last: WatchedSource['last'] = { startedAt: 0, saysDown: false };
  for (let minute = 1; minute <= minutes; minute++)
    if (isDue(source({ last, ...change }), minute * MINUTE)) {
      found.push(minute);
      last = { startedAt: minute * MINUTE, saysDown };
    }
  return found;
}

describe('the timetable of checks', () => {
  it('looks once in each interval', () => {
    const found = looks({});
    expect(found).toHaveLength(96);
    for (const [index, minute] of found.entries()) if (index > 0) expect(minute - found[index - 1]!).toBe(15);
  });
  it('spreads the sources over the interval', () => {
    const minutes = Array.from({ length: 10 }, (_, index) => looks({ id: index + 1 })[0]!);
    expect(new Set(minutes).size).toBeGreaterThan(6);
  });
  it('never asks again by itself after a refused login', () => {
    expect(looks({ isRefused: true })).toEqual([]);
  });
  it('has a second look a minute after a first failure, and goes on as usual once it is known to be down', () => {
    const last = { startedAt: 8 * MINUTE, saysDown: true };
    expect(isDue(source({ id: 15, last }), 8.5 * MINUTE)).toBe(false);
    expect(isDue(source({ id: 15, last }), 9 * MINUTE)).toBe(true);
    expect(isDue(source({ id: 15, last, isDown: true }), 9 * MINUTE)).toBe(false);
    expect(looks({ isDown: true }, true)).toHaveLength(96);
  });
});
