import { Field, Input, Select, Textarea, type InputProps } from '@fluentui/react-components';

import { get, useFormContext } from 'react-hook-form';

interface FieldProps {
  name: string;
  label: string;
  hint?: string | undefined;
  required?: boolean;
}

const emptyIsNull = (value: unknown): unknown =>
  typeof value === 'string' && value.trim() === '' ? null : value;
/** Keeps what cannot be a number as it was typed, so that the form can say so and nothing is lost. */
const asNumber = (value: unknown): unknown => {
  const kept = emptyIsNull(value);
  if (typeof kept !== 'string') return kept;
  const number = Number(kept.replace(',', '.'));
  return Number.isNaN(number) ? kept : number;
};

function useFieldError(name: string): { validationMessage?: string; validationState?: 'error' } {
  const { formState } = useFormContext();
  const error = get(formState.errors, name) as { message?: string } | undefined;
  return error ? { validationMessage: error.message ?? 'Not right', validationState: 'error' } : {};
}

/** A text field that says what is wrong beside itself. */
export function TextField({
  name,
  label,
  hint,
  required,
  ...input
}: FieldProps & Omit<InputProps, 'name' | 'value'>) {
  const { register } = useFormContext();
  const { ref, ...rest } = register(name, { setValueAs: required ? undefined : emptyIsNull });
  return (
    <Field label={label} hint={hint} required={required} {...useFieldError(name)}>
      <Input {...input} {...rest} input={{ ref }} />
    </Field>
  );
}

export function NumberField({ name, label, hint, required }: FieldProps) {
  const { register } = useFormContext();
  const { ref, ...rest } = register(name, { setValueAs: asNumber });
  return (
    <Field label={label} hint={hint} required={required} {...useFieldError(name)}>
      <Input inputMode="decimal" {...rest} input={{ ref }} />
    </Field>
  );
}

export function NoteField({ name, label, hint }: FieldProps) {
  const { register } = useFormContext();
  const { ref, ...rest } = register(name, { setValueAs: emptyIsNull });
  return (
    <Field label={label} hint={hint} {...useFieldError(name)}>
      <Textarea {...rest} textarea={{ ref }} />
    </Field>
  );
}

interface ChoiceFieldProps extends FieldProps {
  options: readonly { value: string | number; label: string }[];
  /** What an empty choice is called; without it something must be chosen. */
  none?: string;
  /** What the chosen text stands for. */
  as?: 'text' | 'number' | 'flag';
}

const readers = {
  text: emptyIsNull,
  number: asNumber,
  flag: (value: unknown) => value === true || value === 'true',
};

export function ChoiceField({ name, label, hint, options, none, as = 'text', required }: ChoiceFieldProps) {
  const { register } = useFormContext();
  const { ref, ...rest } = register(name, { setValueAs: readers[as] });
  return (
    <Field label={label} hint={hint} required={required} {...useFieldError(name)}>
      <Select {...rest} ref={ref}>
        {none !== undefined && <option value="">{none}</option>}
        {options.map(({ value, label: words }) => (
          <option key={value} value={value}>
            {words}
          </option>
        ))}
      </Select>
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
