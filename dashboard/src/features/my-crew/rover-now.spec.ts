import { describe, expect, it } from 'vitest';
import { makeLane } from '../../testing/make-lane';
import { fromLane, fromSpans } from './rover-now';

const lane = makeLane({ state: 'fixed', since: 500_000, heldUntil: 1_010_000 });

describe('a rover by the board', () => {
  it('is as it is now', () => {
    expect(fromLane(lane, 1_005_000, null)).toMatchObject({ state: 'fixed', since: 500_000, asOf: null });
  });
  it('goes quiet by the clock while the stream is there', () => {
    expect(fromLane(lane, 1_600_000, null)).toMatchObject({ state: 'silent', since: 1_010_000 });
  });
  it('does not go quiet because the phone lost its signal: it stays as last known, with the time', () => {
    expect(fromLane(lane, 1_600_000, 1_006_000)).toMatchObject({ state: 'fixed', asOf: 1_006_000 });
  });
});

describe('a rover by its day alone', () => {
  const spans = [
    { state: 'fixed' as const, start: 0, end: 900_000 },
    { state: 'float' as const, start: 900_000, end: 1_000_000 },
  ];
  const rover = { id: 1, label: 'R-01', spans };
  it('is in its newest span when that reaches to the answer', () => {
    expect(fromSpans(rover, 1_000_900)).toMatchObject({ state: 'float', since: 900_000, asOf: 1_000_900 });
  });
  it('is quiet since its newest span ended', () => {
    expect(fromSpans(rover, 1_060_000)).toMatchObject({ state: 'silent', since: 1_000_000 });
  });
  it('was never heard today', () => {
    expect(fromSpans({ ...rover, spans: [] }, 1_060_000)).toMatchObject({ state: 'silent', since: null });
  });
});
