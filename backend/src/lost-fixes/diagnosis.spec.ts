import { defaultLimits } from '@hubtack/contracts/lost-fixes/limits.js';
import { describe, expect, it } from 'vitest';
import { diagnose, type Evidence, type EvidenceEpoch } from './diagnosis.js';

const S = 1000;
const START = 1000 * S;
const epoch = (second: number, more: Partial<EvidenceEpoch> = {}): EvidenceEpoch => ({
  time: START + second * S,
  quality: 4,
  satellites: 22,
  hdop: 0.7,
  ageMs: 1000,
  stationId: 1,
  ...more,
});
const epochs = (
  from: number,
  to: number,
  more: (second: number) => Partial<EvidenceEpoch> = () => ({}),
): EvidenceEpoch[] =>
  Array.from({ length: to - from }, (_, index) => epoch(from + index, more(from + index)));

/** Two good minutes, then `since` for a minute. */
const lost = (since: (second: number) => Partial<EvidenceEpoch>, more: Partial<Evidence> = {}): Evidence => ({
  kind: 'lostFix',
  start: START,
  now: START + 60 * S,
  before: epochs(-120, 0),
  since: epochs(0, 60, since),
  correctedAt: START - 600 * S,
  baseDistanceM: 8400,
  outage: null,
  sourceDown: null,
  ...more,
});
const verdict = (evidence: Evidence) => diagnose(evidence, defaultLimits);
const float = { quality: 5 };

describe('the likely cause', () => {
  it('sky blocked: few satellites, a fall of 30 %, or a bad HDOP, while the age stays good', () => {
    expect(verdict(lost(() => ({ ...float, satellites: 5 })))).toEqual({
      cause: 'skyBlocked',
      evidence: ['satellites 22 → 5', 'HDOP 0.7 → 0.7', 'corrections good (age 1 s)'],
      runnerUp: 'notResolving',
    });
    expect(verdict(lost(() => ({ ...float, satellites: 15 }))).cause).toBe('skyBlocked');
    expect(verdict(lost(() => ({ ...float, satellites: 16 }))).cause).toBe('notResolving');
    expect(verdict(lost(() => ({ ...float, hdop: 3.1 }))).cause).toBe('skyBlocked');
    expect(verdict(lost(() => ({ ...float, hdop: 3 }))).cause).toBe('notResolving');
  });
  it('corrections stopped: the age has risen past the limit while epochs go on', () => {
    const stopped = lost((second) => ({ ...float, ageMs: (31 + second) * S }), {
      before: [...epochs(-120, -30), ...epochs(-30, 0, (second) => ({ ageMs: (second + 31) * S }))],
    });
    expect(verdict(stopped)).toEqual({
      cause: 'correctionsStopped',
      evidence: ['age of corrections rose to 90 s (limit 10 s) while the rover went on reporting'],
      runnerUp: null,
    });
  });
  it('mount point down: checks of it say so, while its corrections have stopped', () => {
    const stopped = (sourceDown: Evidence['sourceDown']) =>
      lost((second) => ({ ...float, ageMs: (31 + second) * S }), { sourceDown });
    expect(verdict(stopped({ since: START - 180 * S, mountPoint: 'TANF00' }))).toMatchObject({
      cause: 'mountPointDown',
      evidence: ['checks of TANF00 find it down for 4 min', 'age up to 90 s'],
      runnerUp: 'correctionsStopped',
    });
    // Good corrections come from somewhere, whatever the checks say.
    const { cause } = verdict(
      lost(() => float, { sourceDown: { since: START - 180 * S, mountPoint: 'TANF00' } }),
    );
    expect(cause).toBe('notResolving');
  });
  it('corrections stopped: also when the receiver gives up and no longer says their age', () => {
    const gaveUp = lost(() => ({ quality: 1, ageMs: null, stationId: null }));
    expect(verdict(gaveUp).cause).toBe('correctionsStopped');
  });
  it('mount point down wins over corrections stopped, which is the runner-up', () => {
    const outage = { rovers: 3, reporting: 4, mountPoint: 'TANF00' };
    const stopped = (second: number) => ({ ...float, ageMs: (20 + second) * S });
    const found = verdict(lost(stopped, { outage }));
    expect(found).toMatchObject({ cause: 'mountPointDown', runnerUp: 'correctionsStopped' });
    expect(found.evidence[0]).toBe('3 of 4 rovers on TANF00 lost their corrections together');
    // A rover under trees meanwhile, with good corrections, has another reason.
    expect(verdict(lost(() => ({ ...float, satellites: 5 }), { outage })).cause).toBe('skyBlocked');
  });
  it('an outage over before the fix went does not explain it', () => {
    const before = epochs(-120, 0, (second) =>
      second >= -90 && second < -75 ? { ageMs: (second + 91) * S } : {},
    );
    expect(verdict(lost(() => ({ ...float, satellites: 5 }), { before })).cause).toBe('skyBlocked');
  });
  it('far from the base: over 20 km, age and sky good, float', () => {
    expect(verdict(lost(() => float, { baseDistanceM: 20_001 }))).toEqual({
      cause: 'farFromBase',
      evidence: ['20.0 km to the base (limit 20 km)', 'corrections good (age 1 s)'],
      runnerUp: 'notResolving',
    });
    expect(verdict(lost(() => float, { baseDistanceM: 20_000 })).cause).toBe('notResolving');
    expect(verdict(lost(() => float, { baseDistanceM: null })).cause).toBe('notResolving');
  });
  it('no position: quality 0, whatever satellites and age say', () => {
    const none = { quality: 0, satellites: 0, ageMs: null, stationId: null, hdop: null };
    expect(verdict(lost(() => none))).toMatchObject({ cause: 'noPosition', runnerUp: 'skyBlocked' });
  });
  it('went quiet: nothing heard when the fix went, or since', () => {
    const quiet = lost(() => ({}), { since: [], before: epochs(-130, -10), now: START + 31 * S });
    expect(verdict(quiet)).toMatchObject({ cause: 'wentQuiet', evidence: ['nothing heard for 42 s'] });
    const back = lost(() => ({}), {
      before: epochs(-130, -10),
      since: epochs(100, 130, () => float),
      now: START + 130 * S,
    });
    expect(verdict(back).cause).toBe('wentQuiet');
    // One sentence that did not come is no silence.
    const late = lost(() => float, { before: epochs(-130, -10), since: epochs(3, 60, () => float) });
    expect(verdict(late).cause).toBe('notResolving');
  });
  it('never corrected: no float or fixed and no station since the shift began', () => {
    const plain = { quality: 1, ageMs: null, stationId: null };
    const noFirstFix = (more: Partial<Evidence> = {}) =>
      lost(() => plain, { kind: 'noFirstFix', before: [], correctedAt: null, ...more });
    expect(verdict(noFirstFix())).toEqual({
      cause: 'neverCorrected',
      evidence: ['no corrections since the shift began: quality 1, no base station id', '22 satellites'],
      runnerUp: null,
    });
    expect(verdict(noFirstFix({ since: epochs(0, 60, () => ({ ...plain, quality: 2 })) })).cause).toBe(
      'neverCorrected',
    );
    expect(verdict(noFirstFix({ since: epochs(0, 60, () => ({ ...plain, satellites: 4 })) }))).toMatchObject({
      cause: 'neverCorrected',
      runnerUp: 'skyBlocked',
    });
  });
  it('never corrected: stays so in the minute in which corrections come at last', () => {
    const since = [
      ...epochs(0, 300, () => ({ quality: 1, ageMs: null, stationId: null })),
      ...epochs(300, 308, () => float),
    ];
    const atLast = (seconds: number) =>
      lost(() => ({}), {
        kind: 'noFirstFix',
        before: [],
        since,
        correctedAt: START + 300 * S,
        now: START + seconds * S,
      });
    expect(verdict(atLast(308)).cause).toBe('neverCorrected');
    expect(verdict(atLast(361)).cause).not.toBe('neverCorrected');
  });
  it('never corrected is no explanation for a fix that was there, whatever is still stored of the time before', () => {
    expect(verdict(lost(() => ({ ...float, satellites: 9 }), { correctedAt: START - 10 * S })).cause).toBe(
      'skyBlocked',
    );
  });
  it('not heard: nothing in the shift', () => {
    const evidence = lost(() => ({}), {
      kind: 'notHeard',
      before: [],
      since: [],
      correctedAt: null,
      now: START + 660 * S,
    });
    expect(verdict(evidence)).toEqual({
      cause: 'notHeard',
      evidence: ['nothing heard since the shift began 11 min ago'],
      runnerUp: null,
    });
  });
  it('unclear: a code position with good corrections and sky', () => {
    expect(verdict(lost(() => ({ quality: 1 })))).toEqual({
      cause: 'unclear',
      evidence: ['the evidence is mixed'],
      runnerUp: null,
    });
  });
  it('limits are the firm’s', () => {
    const evidence = lost((second) => ({ ...float, ageMs: (10 + second / 10) * S }));
    expect(diagnose(evidence, defaultLimits).cause).toBe('correctionsStopped');
    expect(diagnose(evidence, { ...defaultLimits, maxAgeSeconds: 30 }).cause).toBe('notResolving');
  });
});
