import { describe, expect, it } from 'vitest';
import { makeLane } from '../../testing/make-lane';
import { makeLostFix } from '../../testing/make-lost-fix';
import { fitsFilter, noFilter } from './filter';
import { withBlocks } from './blocks';
import { inOrderOfNeed, needOf } from './need';
import { planScale, scaleBarMetres } from '../../components/plan-scale';

const NOW = 1_005_000;
const never = { fixedMs: 0, floatMs: 0, codeMs: 1, noneMs: 0, silentMs: 0 };
const lost = makeLane({ id: 2, crewName: 'Dogwood', state: 'float', since: 900_000 });
const longLost = makeLane({ id: 3, crewName: 'Banksia', state: 'code', since: 100_000 });
const noFirstFix = makeLane({ id: 4, crewName: 'Fernwren', state: 'code', today: never });
const silent = makeLane({ id: 5, crewName: 'Echidna', state: 'silent', since: 300_000, heldUntil: 300_000 });
const unstable = makeLane({
  id: 6,
  crewName: 'Currawong',
  ribbon: [500_000, 600_000, 700_000, 800_000].map((start) => ({
    state: 'fixed' as const,
    start,
    end: start + 1,
  })),
});
const well = makeLane({ id: 1 });
const noLostFixes = new Map();
const onBreak = makeLane({ id: 7, crewName: 'Aspen', state: 'silent', duty: 'paused' });

describe('order of need', () => {
  it('lost before no first fix, quiet, unstable, well; off shift last; the longest first', () => {
    const order = inOrderOfNeed(
      [onBreak, well, unstable, silent, noFirstFix, lost, longLost],
      noLostFixes,
      NOW,
    );
    expect(order.map(({ crewName }) => crewName)).toEqual([
      'Banksia',
      'Dogwood',
      'Fernwren',
      'Echidna',
      'Currawong',
      'Alder',
      'Aspen',
    ]);
  });
  it('what a person has flagged comes first, also while the receiver says fixed', () => {
    const flag = { at: 1, word: 'fixLooksWrong' as const, note: null, by: 'Chief' };
    const flagged = new Map([[9, makeLostFix({ id: 9, kind: 'flag', roverId: well.id, flag })]]);
    expect(inOrderOfNeed([lost, well], flagged, NOW)[0]).toBe(well);
  });
  it('those under a mount point\u2019s lost fix stand together under it', () => {
    const shared = makeLostFix({ id: 20, kind: 'mountPoint', roverId: null, mountPoint: 'TANF00' });
    const member = (id: number, roverId: number) => [id, makeLostFix({ id, roverId, sharedId: 20 })] as const;
    const lostFixes = new Map([[20, shared], member(21, 2), member(22, 4)]);
    expect(withBlocks([3, 2, 5, 4, 1], lostFixes)).toEqual([
      { kind: 'lane', id: 3 },
      { kind: 'block', id: 20 },
      { kind: 'lane', id: 2 },
      { kind: 'lane', id: 4 },
      { kind: 'lane', id: 5 },
      { kind: 'lane', id: 1 },
    ]);
    expect(withBlocks([3], new Map([[20, shared]]))[0]).toEqual({ kind: 'block', id: 20 });
  });
  it('a break and a rover in the store alarm nobody', () => {
    expect(needOf(onBreak, NOW).need).toBe('offShift');
    const inStore = makeLane({ duty: 'noShiftSet', state: 'silent', since: 0, heldUntil: 0 });
    expect(needOf(inStore, 4_000_000).need).toBe('offShift');
  });
});

describe('filter', () => {
  it.each([
    ['dog', true],
    ['R-01', true],
    ['tannery', true],
    ['tanf', true],
    ['quarry', false],
  ])('"%s" fits: %s', (text, fits) => {
    expect(fitsFilter(lost, { ...noFilter, text }, NOW)).toBe(fits);
  });
  it('by state as it is now', () => {
    expect(fitsFilter(well, { ...noFilter, state: 'silent' }, 2_000_000)).toBe(true);
    expect(fitsFilter(well, { ...noFilter, state: 'fixed' }, 2_000_000)).toBe(false);
  });
});

describe('the plan', () => {
  const places = [
    { latitude: -41.3, longitude: 147.0 },
    { latitude: -41.56, longitude: 147.25 },
  ];
  it('north is up, east is right, everything is on it, both ways to one scale', () => {
    const scale = planScale(places, 1000, 620, 60);
    const [north, south] = places as [(typeof places)[0], (typeof places)[0]];
    expect(scale.y(north)).toBeLessThan(scale.y(south));
    expect(scale.x(north)).toBeLessThan(scale.x(south));
    for (const place of places) {
      expect(scale.x(place)).toBeGreaterThanOrEqual(0);
      expect(scale.x(place)).toBeLessThanOrEqual(1000);
      expect(scale.y(place)).toBeGreaterThanOrEqual(59);
      expect(scale.y(place)).toBeLessThanOrEqual(561);
    }
    // One degree of latitude is about 111.3 km.
    const degree = scale.y({ latitude: -42, longitude: 147 }) - scale.y({ latitude: -41, longitude: 147 });
    expect(degree / scale.perMetre).toBeCloseTo(111_320, 0);
  });
  it('the scale bar is a round length that fits', () => {
    expect(scaleBarMetres(0.02, 220)).toBe(10_000);
    expect(scaleBarMetres(0.5, 220)).toBe(200);
  });
});
