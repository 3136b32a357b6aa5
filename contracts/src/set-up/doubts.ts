import type { SetUpCard, SetUpCardBody, SetUpDoubt } from './set-up-card.js';

type Card = Pick<SetUpCardBody, 'poleHeightM' | 'measuringPoint' | 'antennaOffsetM' | 'tilt'>;
type Before = Pick<SetUpCard, 'poleHeightM' | 'measuringPoint' | 'antennaOffsetM'> | null;

/** What poles are made longer by, metres: sections and stops of a quarter, half and whole metre, one and two feet (common practice, no source). */
const POLE_STEPS_M = [0.2, 0.25, 0.3048, 0.5, 0.6096, 1];
/** Heights that are read off as one another: the stop that is usual, and the round number. */
const [EIGHTEEN, TWENTY] = [1.8, 2];
const LOWEST_M = 1;
const HIGHEST_M = 3.5;
const LARGEST_OFFSET_M = 0.3;

const isNear = (a: number, b: number): boolean => Math.abs(a - b) < 0.0005;

/**
 * What of a card is asked about once more, against the card before it: a wrong pole height shifts every point and is seen by
 * nobody afterwards (common practice, no source). In the order in which it is asked.
 */
export function doubtsOf(card: Card, before: Before): SetUpDoubt[] {
  const doubts: SetUpDoubt[] = [];
  const { poleHeightM, antennaOffsetM, measuringPoint } = card;
  if (before) {
    const heights = [poleHeightM, before.poleHeightM].toSorted((a, b) => a - b);
    const change = heights[1]! - heights[0]!;
    if (isNear(heights[0]!, EIGHTEEN) && isNear(heights[1]!, TWENTY)) doubts.push('eighteenAgainstTwenty');
    else if (POLE_STEPS_M.some((step) => isNear(change, step))) doubts.push('poleStep');
  }
  if (poleHeightM < LOWEST_M || poleHeightM > HIGHEST_M) doubts.push('poleUnusual');
  if (measuringPoint === 'mountBottom') {
    const isLarge = Math.abs(antennaOffsetM) > LARGEST_OFFSET_M;
    const isOther =
      before?.measuringPoint === 'mountBottom' && !isNear(before.antennaOffsetM, antennaOffsetM);
    if (isLarge || isOther) doubts.push('offsetUnusual');
  }
  if (card.tilt === 'notCalibrated') doubts.push('tiltNotCalibrated');
  return doubts;
}

const metres = (value: number): string => `${value.toFixed(3)} m`;

/** The question that a doubt is. */
export function doubtWords(doubt: SetUpDoubt, card: Card, before: Before): string {
  switch (doubt) {
    case 'eighteenAgainstTwenty':
    case 'poleStep':
      return `The pole was ${metres(before?.poleHeightM ?? 0)} on the card before and is ${metres(card.poleHeightM)} now: read it off the pole again.`;
    case 'poleUnusual':
      return `${metres(card.poleHeightM)} is unusual for a pole: metres, or another unit?`;
    case 'offsetUnusual':
      return before?.measuringPoint === 'mountBottom' && before.antennaOffsetM !== card.antennaOffsetM
        ? `The antenna offset was ${metres(before.antennaOffsetM)} and is ${metres(card.antennaOffsetM)} now: is it another antenna?`
        : `${metres(card.antennaOffsetM)} is a large offset for an antenna.`;
    case 'tiltNotCalibrated':
      return 'Tilt compensation is on and not calibrated: points of a leaning pole will be wrong.';
  }
}

/** The field of the card that a doubt is about. */
export const doubtFields: Record<SetUpDoubt, keyof Card> = {
  eighteenAgainstTwenty: 'poleHeightM',
  poleStep: 'poleHeightM',
  poleUnusual: 'poleHeightM',
  offsetUnusual: 'antennaOffsetM',
  tiltNotCalibrated: 'tilt',
};
