import { Button } from '@fluentui/react-components';
import {
  pauseReason,
  pauseReasonLabels,
  pauseReasons,
  type Shift,
  type ShiftBody,
} from '@hubtack/contracts/shifts/shift.js';
import { useState } from 'react';
import { useFieldArray, useFormContext } from 'react-hook-form';
import { z } from 'zod';
import { Form } from '../../components/form';
import { ChoiceInput, DateTimeInput, TextField } from '../../components/form-fields';
import { zoneName } from '../../lib/format';
import { useMe } from '../../lib/session';
import { useAddShift, useChangeShift, useRemoveShift } from '../../lib/shifts';
import { fieldText, instantOf } from './zone-time';

const wanted = 'Write a date and a time';
const dateTime = z.string(wanted).min(16, wanted);
const shiftFields = z.object({
  start: dateTime,
  end: dateTime.nullable(),
  pauses: z.array(
    z.object({
      start: dateTime,
      end: dateTime.nullable(),
      reason: pauseReason,
      /** As it was marked; lines move when one is removed. */
      was: z.object({ start: z.number(), end: z.number().nullable() }).nullable(),
    }),
  ),
});
type ShiftFields = z.infer<typeof shiftFields>;

/** Marks set right: beginning, end and pauses, in the firm's zone. */
export function ShiftForm({ crewId, shift, onDone }: { crewId: number; shift?: Shift; onDone: () => void }) {
  const { timeZone: zone } = useMe();
  const [opened] = useState(() => Date.now());
  const add = useAddShift(crewId);
  const change = useChangeShift(shift?.id ?? 0);
  const remove = useRemoveShift(shift?.id ?? 0);
  const text = (at: number | null) => (at === null ? null : fieldText(at, zone));
  const bodyOf = ({ start, end, pauses }: ShiftFields): ShiftBody => ({
    start: instantOf(start, zone, shift?.start)!,
    end: instantOf(end, zone, shift?.end),
    pauses: pauses.map((pause) => ({
      start: instantOf(pause.start, zone, pause.was?.start)!,
      end: instantOf(pause.end, zone, pause.was?.end),
      reason: pause.reason,
    })),
  });
  return (
    <Form
      schema={shiftFields}
      defaults={{
        start: text(shift?.start ?? opened) ?? '',
        end: text(shift?.end ?? null),
        pauses:
          shift?.pauses.map(({ start, end, reason }) => ({
            start: text(start)!,
            end: text(end),
            reason,
            was: { start, end },
          })) ?? [],
      }}
      button="Save"
      onCancel={onDone}
      submit={async (fields) => {
        const body = bodyOf(fields);
        await (shift ? change.mutateAsync(body) : add.mutateAsync(body));
        onDone();
      }}
    >
      <p>
        Times of {zoneName(opened, zone)}. The figures of the day follow; the audit keeps what stood before.
      </p>
      <TextField name="start" label="Start" type="datetime-local" required />
      <TextField name="end" label="End" type="datetime-local" hint="Empty while the shift runs" />
      <PauseFields />
      {shift && (
        <Button
          disabled={remove.isPending}
          onClick={() => {
            remove.mutate(undefined, { onSuccess: onDone });
          }}
        >
          Remove this shift
        </Button>
      )}
    </Form>
  );
}

interface Told {
  message?: string;
}
/** Of the pauses as a whole, or a list with those of each line. */
type PauseErrors = Told & { root?: Told } & ({ start?: Told; end?: Told } | undefined)[];

function PauseFields() {
  const { formState } = useFormContext();
  const { fields, append, remove } = useFieldArray({ name: 'pauses' });
  const error = formState.errors.pauses as PauseErrors | undefined;
  const line = Array.isArray(error) ? error.find((one) => one?.start ?? one?.end) : undefined;
  const message = error?.message ?? error?.root?.message ?? (line?.start ?? line?.end)?.message;
  return (
    <fieldset className="pattern">
      <legend>Pauses</legend>
      {fields.map((field, index) => (
        <div key={field.id} className="pattern-line">
          <ChoiceInput
            name={`pauses.${index}.reason`}
            label="Reason"
            as="text"
            options={pauseReasons.map((value) => ({ value, label: pauseReasonLabels[value] }))}
          />
          <DateTimeInput name={`pauses.${index}.start`} label="From" />
          <DateTimeInput name={`pauses.${index}.end`} label="To" />
          <Button appearance="subtle" aria-label={`Remove pause ${index + 1}`} onClick={() => remove(index)}>
            Remove
          </Button>
        </div>
      ))}
      {message && <p role="alert">{message}</p>}
      <Button onClick={() => append({ start: '', end: null, reason: 'lunch', was: null })}>
        Add a pause
      </Button>
    </fieldset>
  );
}
