import { assert, constantFrom, integer, property, array, record } from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { HeardSpan } from '../fixes/timeline.js';
import { againReasonOf, type CardFacts, type RoverNow, type ShotFacts } from './shot-validity.js';

const MINUTE = 60_000;
const SHOT = 1000 * MINUTE;
const card: CardFacts = {
  id: 1,
  poleHeightM: 1.8,
  measuringPoint: 'mountBottom',
  antennaOffsetM: 0.09,
  tilt: 'calibrated',
  correctionSourceId: 3,
};
const shot = (change: Partial<ShotFacts> = {}): ShotFacts => ({
  at: SHOT,
  stationId: 7,
  mountPoint: 'TANF00',
  card,
  ...change,
});
const fixed = (start: number, end: number): HeardSpan => ({
  state: 'fixed',
  start: SHOT + start * MINUTE,
  end: SHOT + end * MINUTE,
});
const float = (start: number, end: number): HeardSpan => ({ ...fixed(start, end), state: 'float' });
const rover = (change: Partial<RoverNow> = {}): RoverNow => ({
  now: SHOT + 60 * MINUTE,
  dayStart: SHOT - 60 * MINUTE,
  stationId: 7,
  mountPoint: 'TANF00',
  card,
  spans: [fixed(-30, 60)],
  ...change,
});
const again = (of: Partial<ShotFacts>, now: Partial<RoverNow>) =>
  againReasonOf(shot(of), rover(now), 10 * MINUTE);

describe('a check shot counts', () => {
  it.each<[string, Partial<ShotFacts>, Partial<RoverNow>, string | null]>([
    ['while nothing has changed', {}, {}, null],
    ['not on another day', { at: SHOT - 61 * MINUTE }, {}, 'newDay'],
    ['not with another station', {}, { stationId: 8 }, 'baseChanged'],
    ['not on another mount point', {}, { mountPoint: 'QUARB2' }, 'baseChanged'],
    ['when the receiver says no station now', {}, { stationId: null }, null],
    ['when it said none then', { stationId: null }, {}, null],
    ['not with another pole height', {}, { card: { ...card, id: 2, poleHeightM: 2 } }, 'cardChanged'],
    ['with a new card that says the same', {}, { card: { ...card, id: 2 } }, null],
    ['not once a first card has come', { card: null }, {}, 'cardChanged'],
    [
      'after ten minutes of float, exactly',
      {},
      { spans: [fixed(0, 10), float(10, 20), fixed(20, 60)] },
      null,
    ],
    ['not after a longer loss', {}, { spans: [fixed(0, 10), float(10, 20.1), fixed(20.1, 60)] }, 'fixLost'],
    [
      'not after float and silence in one piece',
      {},
      { spans: [fixed(0, 10), float(10, 15), fixed(21, 60)] },
      'fixLost',
    ],
    ['not while it is silent for long', {}, { spans: [fixed(0, 45)] }, 'fixLost'],
    ['after several short losses', {}, { spans: [fixed(0, 10), fixed(19, 30), fixed(38, 60)] }, null],
  ])('%s', (_what, of, now, reason) => {
    expect(again(of, now)).toBe(reason);
  });
  it('and what makes it count no more goes on doing so as time passes', () => {
    const spans = array(
      record({
        state: constantFrom('fixed' as const, 'float' as const),
        length: integer({ min: 1, max: 15 }),
      }),
      {
        minLength: 1,
        maxLength: 8,
      },
    );
    assert(
      property(spans, integer({ min: 0, max: 90 }), integer({ min: 0, max: 60 }), (lengths, first, more) => {
        let at = 0;
        const list = lengths.map(({ state, length }) => {
          const span = { ...fixed(at, at + length), state };
          at += length;
          return span;
        });
        const seenAt = (minute: number) => {
          const now = SHOT + minute * MINUTE;
          const known = list
            .filter(({ start }) => start < now)
            .map((span) => ({ ...span, end: Math.min(span.end, now) }));
          return again({}, { now, spans: known });
        };
        if (seenAt(first) === 'fixLost') expect(seenAt(first + more)).toBe('fixLost');
      }),
    );
  });
});
