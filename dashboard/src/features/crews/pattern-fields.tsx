import { Button, Input, Select } from '@fluentui/react-components';
import { useFieldArray, useFormContext } from 'react-hook-form';
import './pattern-fields.css';

export const weekdays = ['Monday', 'Tuesday', 'Wednesday', 'Thursday', 'Friday', 'Saturday', 'Sunday'];

/** The weekly pattern: a line for each working day, in the firm's zone. */
export function PatternFields() {
  const { register, watch, formState } = useFormContext();
  const { fields, append, remove } = useFieldArray({ name: 'pattern' });
  const used = (watch('pattern') as { weekday: number }[]).map(({ weekday }) => Number(weekday));
  const next = weekdays.findIndex((_, index) => !used.includes(index + 1)) + 1;
  const error = formState.errors.pattern as { message?: string; root?: { message?: string } } | undefined;
  const message = error?.message ?? error?.root?.message;
  return (
    <fieldset className="pattern">
      <legend>Weekly pattern</legend>
      <p>Counts on days without shift marks. Time outside it is not held against the crew.</p>
      {fields.map((field, index) => {
        const start = register(`pattern.${index}.start`);
        const end = register(`pattern.${index}.end`);
        const weekday = register(`pattern.${index}.weekday`, { setValueAs: Number });
        return (
          <div key={field.id} className="pattern-line">
            <Select aria-label="Weekday" {...weekday} ref={weekday.ref}>
              {weekdays.map((name, day) => (
                <option key={name} value={day + 1}>
                  {name}
                </option>
              ))}
            </Select>
            <Input type="time" aria-label="From" {...start} input={{ ref: start.ref }} />
            <Input type="time" aria-label="To" {...end} input={{ ref: end.ref }} />
            <Button
              appearance="subtle"
              onClick={() => remove(index)}
              aria-label={`Remove ${weekdays[used[index]! - 1]}`}
            >
              Remove
            </Button>
          </div>
        );
      })}
      {message && <p role="alert">{message}</p>}
      {next > 0 && (
        <Button onClick={() => append({ weekday: next, start: '07:00', end: '15:30' })}>
          Add {weekdays[next - 1]}
        </Button>
      )}
    </fieldset>
  );
}
