import { Button } from '@fluentui/react-components';
import { useFieldArray, useFormContext } from 'react-hook-form';
import { ChoiceInput, TimeInput } from './form-fields';
import { weekdays } from '../lib/weekdays';
import './pattern-fields.css';

const options = weekdays.map((name, index) => ({ value: index + 1, label: name }));

const HINT = 'Counts on days without shift marks. Time outside it is not held against the crew.';

/** The weekly pattern: a line for each working day, in the firm's zone. */
export function PatternFields({ name = 'pattern', legend = 'Weekly pattern', hint = HINT }) {
  const { watch, formState } = useFormContext();
  const { fields, append, remove } = useFieldArray({ name });
  const used = (watch(name) as { weekday: number }[]).map(({ weekday }) => weekday);
  const next = weekdays.findIndex((_, index) => !used.includes(index + 1)) + 1;
  const error = formState.errors[name] as { message?: string; root?: { message?: string } } | undefined;
  const message = error?.message ?? error?.root?.message;
  return (
    <fieldset className="pattern">
      <legend>{legend}</legend>
      <p>{hint}</p>
      {fields.map((field, index) => (
        <div key={field.id} className="pattern-line">
          <ChoiceInput name={`${name}.${index}.weekday`} label="Weekday" options={options} as="number" />
          <TimeInput name={`${name}.${index}.start`} label="From" />
          <TimeInput name={`${name}.${index}.end`} label="To" />
          <Button
            appearance="subtle"
            onClick={() => remove(index)}
            aria-label={`Remove ${weekdays[used[index]! - 1]}`}
          >
            Remove
          </Button>
        </div>
      ))}
      {message && <p role="alert">{message}</p>}
      {next > 0 && (
        <Button onClick={() => append({ weekday: next, start: '07:00', end: '15:30' })}>
          Add {weekdays[next - 1]}
        </Button>
      )}
    </fieldset>
  );
}
