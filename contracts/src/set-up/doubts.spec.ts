import { describe, expect, it } from 'vitest';
import { doubtsOf, doubtWords } from './doubts.js';
import type { SetUpCardBody } from './set-up-card.js';

type Card = Pick<SetUpCardBody, 'poleHeightM' | 'measuringPoint' | 'antennaOffsetM' | 'tilt'>;
const card = (change: Partial<Card> = {}): Card => ({
  poleHeightM: 1.8,
  measuringPoint: 'mountBottom',
  antennaOffsetM: 0.093,
  tilt: 'calibrated',
  ...change,
});

describe('what is asked about once more', () => {
  it.each<[string, Partial<Card>, Partial<Card> | null, string[]]>([
    ['the same again', {}, {}, []],
    ['the first card', {}, null, []],
    ['1.8 against 2.0', { poleHeightM: 2 }, {}, ['eighteenAgainstTwenty']],
    ['2.0 against 1.8', {}, { poleHeightM: 2 }, ['eighteenAgainstTwenty']],
    ['a quarter of a metre', { poleHeightM: 2.05 }, {}, ['poleStep']],
    ['half a metre less', { poleHeightM: 1.3 }, {}, ['poleStep']],
    ['a foot', { poleHeightM: 2.1048 }, {}, ['poleStep']],
    ['some other change', { poleHeightM: 1.843 }, {}, []],
    ['centimetres written as metres', { poleHeightM: 0.18 }, null, ['poleUnusual']],
    ['a pole of four metres', { poleHeightM: 4 }, null, ['poleUnusual']],
    ['another antenna', { antennaOffsetM: 0.12 }, {}, ['offsetUnusual']],
    ['a large offset', { antennaOffsetM: 0.5 }, null, ['offsetUnusual']],
    ['an offset that does not count', { measuringPoint: 'phaseCentre', antennaOffsetM: 0.5 }, null, []],
    ['tilt not calibrated', { tilt: 'notCalibrated' }, {}, ['tiltNotCalibrated']],
    [
      'several at once',
      { poleHeightM: 2, tilt: 'notCalibrated' },
      {},
      ['eighteenAgainstTwenty', 'tiltNotCalibrated'],
    ],
  ])('%s', (_what, now, before, doubts) => {
    expect(doubtsOf(card(now), before && card(before))).toEqual(doubts);
  });
  it('in words, with both heights', () => {
    expect(doubtWords('eighteenAgainstTwenty', card({ poleHeightM: 2 }), card())).toBe(
      'The pole was 1.800 m on the card before and is 2.000 m now: read it off the pole again.',
    );
  });
});
