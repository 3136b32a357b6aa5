import { correctionFormatLabels } from '@hubtack/contracts/corrections/correction-source.js';
import {
  measuringPointLabels,
  tiltLabels,
  type SetUpCard,
  type SetUpCardBody,
  type SetUpStart,
} from '@hubtack/contracts/set-up/set-up-card.js';

export type CardValues = Pick<
  SetUpCardBody,
  | 'poleHeightM'
  | 'measuringPoint'
  | 'antennaOffsetM'
  | 'tilt'
  | 'correctionSourceId'
  | 'messageFormat'
  | 'toleranceProfile'
>;

export interface CardChange {
  name: string;
  before: string;
  now: string;
}

const metres = (value: unknown): string => (typeof value === 'number' ? `${value.toFixed(3)} m` : 'not said');

/** What of a card is otherwise than on the one before, in words. While somebody types, a value may be no number yet. */
export function cardChanges(
  now: CardValues,
  before: SetUpCard,
  choices: SetUpStart['choices'],
): CardChange[] {
  const source = (id: number | null) => choices.find((one) => one.id === id)?.mountPoint ?? 'not said';
  const rows: CardChange[] = [
    { name: 'Pole height', before: metres(before.poleHeightM), now: metres(now.poleHeightM) },
    {
      name: 'Measured to',
      before: measuringPointLabels[before.measuringPoint],
      now: measuringPointLabels[now.measuringPoint],
    },
    { name: 'Antenna offset', before: metres(before.antennaOffsetM), now: metres(now.antennaOffsetM) },
    { name: 'Tilt compensation', before: tiltLabels[before.tilt], now: tiltLabels[now.tilt] },
    { name: 'Corrections', before: source(before.correctionSourceId), now: source(now.correctionSourceId) },
    {
      name: 'Messages',
      before: correctionFormatLabels[before.messageFormat],
      now: correctionFormatLabels[now.messageFormat],
    },
    {
      name: 'Tolerance',
      before: before.toleranceProfile ?? 'not said',
      now: now.toleranceProfile ?? 'not said',
    },
  ];
  return rows.filter((row) => row.before !== row.now);
}
