import {
  correctionFormatLabels,
  correctionFormats,
} from '@hubtack/contracts/corrections/correction-source.js';
import { doubtsOf, doubtWords } from '@hubtack/contracts/set-up/doubts.js';
import {
  measuringPointLabels,
  measuringPoints,
  setUpCardBody,
  tiltLabels,
  tiltStates,
  type SetUpCard,
  type SetUpCardBody,
  type SetUpDoubt,
  type SetUpStart,
} from '@hubtack/contracts/set-up/set-up-card.js';
import { useState } from 'react';
import { useFormContext } from 'react-hook-form';
import type { z } from 'zod';
import { ChoiceField, NoteField, NumberField, TextField } from '../../components/form-fields';
import { Form } from '../../components/form';
import { ApiError } from '../../lib/api';
import { useMe } from '../../lib/session';
import { cardChanges, type CardValues } from '../../lib/card-changes';
import { DoubtQuestions } from './doubt-questions';
import { GroundLine, TiltTable } from './ground-line';

const options = <T extends string>(values: readonly T[], labels: Record<T, string>) =>
  values.map((value) => ({ value, label: labels[value] }));
const FEET_A_METRE = 1 / 0.3048;

interface SetUpFormProps {
  roverId: number;
  start: SetUpStart;
  /** The card that it starts from; null for an empty one. */
  from: SetUpCard | null;
  save: (body: SetUpCardBody) => Promise<unknown>;
  /** The newest card as the server has it now. */
  readNewest: () => Promise<SetUpCard | null>;
}

/** How the rover is set up this morning, against the card before. */
export function SetUpForm({ roverId, start, from, save, readNewest }: SetUpFormProps) {
  const me = useMe();
  const [newest, setNewest] = useState(start.card);
  const [asked, setAsked] = useState<readonly string[]>([]);
  // By the words, figures and all: a tick for one height is none for another.
  const [confirmed, setConfirmed] = useState<readonly string[]>([]);
  const defaults: Partial<z.input<typeof setUpCardBody>> = {
    roverId,
    ...(from ? { poleHeightM: from.poleHeightM } : {}),
    measuringPoint: from?.measuringPoint ?? 'mountBottom',
    antennaOffsetM: from?.antennaOffsetM ?? 0,
    tilt: from?.tilt === 'off' ? 'off' : 'notCalibrated',
    correctionSourceId: start.correctionSourceId ?? from?.correctionSourceId ?? null,
    messageFormat: from?.messageFormat ?? 'any',
    toleranceProfile: from?.toleranceProfile ?? start.toleranceProfile,
    checkedBy: me.name,
    note: null,
    confirmed: [],
  };
  const ask = (body: SetUpCardBody, before: SetUpCard | null): SetUpDoubt[] => {
    const doubts = doubtsOf(body, before);
    const questions = doubts.map((doubt) => doubtWords(doubt, body, before));
    setAsked(questions);
    setConfirmed(confirmed.filter((words) => questions.includes(words)));
    if (questions.some((words) => !confirmed.includes(words)))
      throw new Error('Look again at what is asked, and tick it when it is right.');
    return doubts;
  };
  const submit = async (body: SetUpCardBody) => {
    const doubts = ask(body, newest);
    try {
      await save({ ...body, confirmed: doubts });
    } catch (error) {
      if (!(error instanceof ApiError && error.code === 'needsConfirmation')) throw error;
      // Another card has been kept meanwhile: this one is compared with that.
      const before = await readNewest();
      setNewest(before);
      ask(body, before);
      throw error;
    }
  };
  return (
    <Form schema={setUpCardBody} defaults={defaults} button="Keep the card" submit={submit}>
      <PoleFields roverId={roverId} />
      <ChoiceField
        name="tilt"
        label="Tilt compensation"
        hint="Ask the receiver, not memory: a calibration of yesterday is none of today."
        options={options(tiltStates, tiltLabels)}
        as="text"
      />
      <ChoiceField
        name="correctionSourceId"
        label="Corrections from"
        options={start.choices.map(({ id, name, mountPoint }) => ({
          value: id,
          label: `${mountPoint} (${name})`,
        }))}
        none="not on the list"
        as="number"
      />
      <div className="form-row">
        <ChoiceField
          name="messageFormat"
          label="Messages"
          options={options(correctionFormats, correctionFormatLabels)}
          as="text"
        />
        <ChoiceField
          name="toleranceProfile"
          label="Tolerance profile"
          options={[
            ...new Set([...start.profiles, ...(from?.toleranceProfile ? [from.toleranceProfile] : [])]),
          ].map((name) => ({ value: name, label: name }))}
          none="not said"
        />
      </div>
      <TextField name="checkedBy" label="Checked by" required />
      <NoteField name="note" label="Note (may be left empty)" />
      <Changes before={from} choices={start.choices} />
      <DoubtQuestions
        asked={asked}
        confirmed={confirmed}
        onConfirm={(words, isConfirmed) =>
          setConfirmed(isConfirmed ? [...confirmed, words] : confirmed.filter((one) => one !== words))
        }
      />
    </Form>
  );
}

function PoleFields({ roverId }: { roverId: number }) {
  const { watch } = useFormContext();
  const { units } = useMe();
  const [height, offset, point] = watch(['poleHeightM', 'antennaOffsetM', 'measuringPoint']) as [
    unknown,
    unknown,
    CardValues['measuringPoint'],
  ];
  const isNumber = typeof height === 'number' && height >= 0 && height <= 10;
  const pole = {
    poleHeightM: isNumber ? height : 0,
    antennaOffsetM: typeof offset === 'number' && Math.abs(offset) <= 0.5 ? offset : 0,
    measuringPoint: point,
  };
  const feet = units === 'feet' && isNumber ? ` That is ${(height * FEET_A_METRE).toFixed(2)} ft.` : '';
  return (
    <>
      <NumberField
        name="poleHeightM"
        label="Pole height, m"
        hint={`Read off the pole, from the ground up to the measuring point. A wrong one shifts every point taken.${feet}`}
        required
      />
      <ChoiceField
        name="measuringPoint"
        label="Measured to"
        hint="It must be the same as on the controller."
        options={options(measuringPoints, measuringPointLabels)}
        as="text"
      />
      {point === 'mountBottom' && (
        <NumberField
          name="antennaOffsetM"
          label="Antenna offset, m"
          hint="From there up to the phase centre, as the antenna’s sheet says"
          required
        />
      )}
      {isNumber && <GroundLine roverId={roverId} pole={pole} />}
      {isNumber && <TiltTable pole={pole} />}
    </>
  );
}

/** Seen before it is kept: what is otherwise than on the card that it started from. */
function Changes({ before, choices }: { before: SetUpCard | null; choices: SetUpStart['choices'] }) {
  const { watch } = useFormContext();
  const values = watch() as CardValues;
  if (!before) return null;
  const changes = cardChanges(values, before, choices);
  if (changes.length === 0) return <p className="set-up-changes">All as on the card before.</p>;
  return (
    <div className="set-up-changes">
      <p>Otherwise than on the card before:</p>
      <ul>
        {changes.map(({ name, before: was, now }) => (
          <li key={name}>
            {name}: <del>{was}</del> <ins>{now}</ins>
          </li>
        ))}
      </ul>
    </div>
  );
}
