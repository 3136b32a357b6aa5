import { describe, expect, it } from 'vitest';
import { nextCorrections, noCorrectionsYet, type CorrectionEpoch } from './corrections-watch.js';
import { isOutageOver, outageOf, type MountPointRover } from './shared-cause.js';

const S = 1000;
const LOST_AFTER = 30 * S;
const rover = (roverId: number, lostAt: number | null, isReporting = true): MountPointRover => ({
  roverId,
  mountPoint: 'TANF00',
  isReporting,
  lostAt: lostAt === null ? null : lostAt * S,
});
const at = (now: number, ...rovers: MountPointRover[]) => outageOf(rovers, now * S, LOST_AFTER);

describe('a mount point that has failed', () => {
  it('two of three within a minute; not one, not two of five', () => {
    expect(at(60, rover(1, 10), rover(2, 12), rover(3, null))).toEqual({ start: 10 * S, roverIds: [1, 2] });
    expect(at(60, rover(1, 10))).toBeNull();
    expect(at(60, rover(1, 10), rover(2, 12), rover(3, null), rover(4, null), rover(5, null))).toBeNull();
  });
  it('exactly half is enough; those that do not report are not counted', () => {
    expect(at(60, rover(1, 10), rover(2, 12), rover(3, null), rover(4, null))?.roverIds).toEqual([1, 2]);
    const away = [3, 4, 5, 6].map((id) => rover(id, null, false));
    expect(at(60, rover(1, 10), rover(2, 12), ...away)?.roverIds).toEqual([1, 2]);
    expect(at(60, rover(1, 10), rover(2, 12, false))).toBeNull();
  });
  it('61 s apart is not together, 60 s is', () => {
    expect(at(200, rover(1, 10), rover(2, 70))?.roverIds).toEqual([1, 2]);
    expect(at(200, rover(1, 10), rover(2, 71))).toBeNull();
  });
  it('a rover that was without for long does not hide the others, which fail together', () => {
    expect(at(1000, rover(1, 10), rover(2, 900), rover(3, 905))).toEqual({
      start: 900 * S,
      roverIds: [2, 3],
    });
  });
  it('a dropout of less than half a minute is none', () => {
    expect(at(41, rover(1, 10), rover(2, 12))).toBeNull();
    expect(at(42, rover(1, 10), rover(2, 12))).not.toBeNull();
  });
  it('is over when fewer than half of those reporting are without', () => {
    expect(isOutageOver([rover(1, 10), rover(2, null)])).toBe(false);
    expect(isOutageOver([rover(1, 10), rover(2, null), rover(3, null)])).toBe(true);
    expect(isOutageOver([rover(1, 10, false), rover(2, 12, false)])).toBe(true);
  });
});

describe('corrections of one rover', () => {
  const limits = { maxAgeMs: 10 * S, ageClearsMs: 5 * S };
  const epoch = (time: number, age: number | null, quality = 4): CorrectionEpoch => ({
    time: time * S,
    quality,
    ageMs: age === null ? null : age * S,
    stationId: age === null ? null : 1,
  });
  const after = (...epochs: CorrectionEpoch[]) =>
    epochs.reduce((state, next) => nextCorrections(state, next, limits), noCorrectionsYet);

  it('are lost past the limit, from the newest correction on', () => {
    expect(after(epoch(100, 1), epoch(109, 10)).lostAt).toBeNull();
    expect(after(epoch(100, 1), epoch(110, 11)).lostAt).toBe(99 * S);
  });
  it('an age that swings about the limit is one outage, over below the margin', () => {
    const lost = [epoch(100, 1), epoch(111, 12), epoch(112, 8)];
    expect(after(...lost).lostAt).toBe(99 * S);
    expect(after(...lost, epoch(113, 4.9)).lostAt).toBeNull();
  });
  it('a receiver that gives up on them stops saying their age: lost still, and from the same instant', () => {
    expect(after(epoch(100, 1), epoch(105, null, 1), epoch(112, null, 1)).lostAt).toBe(99 * S);
    expect(after(epoch(100, 1), epoch(105, null, 1)).lostAt).toBeNull();
  });
  it('one that never had any has none to lose', () => {
    expect(after(epoch(100, null, 1), epoch(200, null, 1))).toEqual(noCorrectionsYet);
  });
});
