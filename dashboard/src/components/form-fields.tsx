import { Checkbox, Field, Input, Select, Textarea, type InputProps } from '@fluentui/react-components';
import { useState } from 'react';
import { useController, type FieldError } from 'react-hook-form';

interface FieldProps {
  name: string;
  label: string;
  hint?: string | undefined;
  /** What looks wrong while it is typed; it stops nobody. */
  doubt?: string | undefined;
  required?: boolean;
}

const emptyIsNull = (text: string): string | null => (text.trim() === '' ? null : text);
/** What cannot be a number stays as it was typed, so that the form can say so and nothing is lost. */
const asNumber = (text: string): number | string | null => {
  const kept = emptyIsNull(text);
  const number = Number(kept?.replace(',', '.'));
  return kept === null || Number.isNaN(number) ? kept : number;
};
const readers = {
  text: (text: string) => text,
  optionalText: emptyIsNull,
  number: asNumber,
  flag: (text: string) => text === 'true',
};
type Reader = keyof typeof readers;

const textOf = (value: unknown): string =>
  value === null || value === undefined ? '' : `${value as string | number | boolean}`;

function stateOf(error: FieldError | undefined, doubt: string | undefined) {
  if (error) return { validationMessage: error.message ?? 'Not right', validationState: 'error' } as const;
  if (!doubt) return {};
  return { validationMessage: { children: doubt, role: 'status' }, validationState: 'warning' } as const;
}

/** A field of the form around it: what is shown is what was typed, what the form holds is what that stands for. */
function useFormField(name: string, reader: Reader, doubt?: string) {
  const { field, fieldState } = useController({ name });
  const [text, setText] = useState(() => textOf(field.value));
  return {
    input: {
      name,
      value: text,
      onBlur: field.onBlur,
      onChange: (_: unknown, { value }: { value: string }) => {
        setText(value);
        field.onChange(readers[reader](value));
      },
    },
    ref: field.ref,
    state: stateOf(fieldState.error, doubt),
  };
}

/** A text field that says what is wrong beside itself. */
export function TextField({
  name,
  label,
  hint,
  doubt,
  required,
  ...props
}: FieldProps & Omit<InputProps, 'name' | 'value' | 'required'>) {
  const { input, ref, state } = useFormField(name, required ? 'text' : 'optionalText', doubt);
  return (
    <Field label={label} hint={hint} required={required} {...state}>
      <Input {...props} {...input} input={{ ref }} />
    </Field>
  );
}

export function NumberField({ name, label, hint, doubt, required }: FieldProps) {
  const { input, ref, state } = useFormField(name, 'number', doubt);
  return (
    <Field label={label} hint={hint} required={required} {...state}>
      <Input inputMode="decimal" {...input} input={{ ref }} />
    </Field>
  );
}

export function NoteField({ name, label, hint }: FieldProps) {
  const { input, ref, state } = useFormField(name, 'optionalText');
  return (
    <Field label={label} hint={hint} {...state}>
      <Textarea {...input} textarea={{ ref }} />
    </Field>
  );
}

/** A clock time in a line of its own kind, named for people who do not see its place. */
export function TimeInput({ name, label }: { name: string; label: string }) {
  const { input, ref } = useFormField(name, 'text');
  return <Input type="time" aria-label={label} {...input} input={{ ref }} />;
}

/** A date and time in a line of its own kind; empty is nothing. */
export function DateTimeInput({ name, label }: { name: string; label: string }) {
  const { input, ref } = useFormField(name, 'optionalText');
  return <Input type="datetime-local" aria-label={label} {...input} input={{ ref }} />;
}

interface ChoiceFieldProps extends FieldProps {
  options: readonly { value: string | number; label: string }[];
  /** What an empty choice is called; without it something must be chosen. */
  none?: string;
  /** What the chosen text stands for. */
  as?: Reader;
}

/** A choice without a label of its own beside it. */
export function ChoiceInput({ name, label, options, none, as = 'optionalText' }: ChoiceFieldProps) {
  const { input, ref } = useFormField(name, as);
  return (
    <Select aria-label={label} {...input} ref={ref}>
      {none !== undefined && <option value="">{none}</option>}
      {options.map(({ value, label: words }) => (
        <option key={value} value={value}>
          {words}
        </option>
      ))}
    </Select>
  );
}

export function ChoiceField({ hint, required, ...choice }: ChoiceFieldProps) {
  const { state } = useFormField(choice.name, choice.as ?? 'optionalText');
  return (
    <Field label={choice.label} hint={hint} required={required} {...state}>
      <ChoiceInput {...choice} />
    </Field>
  );
}

/** Yes or no. */
export function FlagField({ name, label, hint }: FieldProps) {
  const {
    field: { value, onBlur, onChange, ref },
  } = useController({ name });
  return (
    <Field hint={hint}>
      <Checkbox
        name={name}
        label={label}
        checked={value === true}
        onBlur={onBlur}
        onChange={(_, { checked }) => onChange(checked === true)}
        ref={ref}
      />
    </Field>
  );
}

/** Nothing is deleted: what is done with is put away, and its past stays. */
export const InUseField = ({ name, inUse }: { name: 'active' | 'retired'; inUse: boolean }) => (
  <ChoiceField
    name={name}
    label="In use"
    as="flag"
    options={[
      { value: String(inUse), label: 'In use' },
      { value: String(!inUse), label: 'Put away; its past stays' },
    ]}
  />
);
