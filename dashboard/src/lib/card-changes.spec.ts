import type { SetUpCard } from '@hubtack/contracts/set-up/set-up-card.js';
import { expect, it } from 'vitest';
import { cardChanges, type CardValues } from './card-changes';

const card: CardValues = {
  poleHeightM: 1.8,
  measuringPoint: 'mountBottom',
  antennaOffsetM: 0.093,
  tilt: 'calibrated',
  correctionSourceId: 1,
  messageFormat: 'msm',
  toleranceProfile: 'topographic',
};
const choices = [
  { id: 1, name: 'Tannery', mountPoint: 'TANF00' },
  { id: 2, name: 'Quarry', mountPoint: 'QUARB2' },
];
it('a card like the one before has no change', () => {
  expect(cardChanges(card, card as SetUpCard, choices)).toEqual([]);
});
it('says what is otherwise, in words', () => {
  expect(cardChanges({ ...card, poleHeightM: 2, correctionSourceId: 2 }, card as SetUpCard, choices)).toEqual(
    [
      { name: 'Pole height', before: '1.800 m', now: '2.000 m' },
      { name: 'Corrections', before: 'TANF00', now: 'QUARB2' },
    ],
  );
});
it('what is half typed is no number yet', () => {
  const half = { ...card, poleHeightM: '1.' as unknown as number };
  expect(cardChanges(half, card as SetUpCard, choices)).toEqual([
    { name: 'Pole height', before: '1.800 m', now: 'not said' },
  ]);
});
