import { Button, Field, MessageBar, MessageBarBody, Textarea } from '@fluentui/react-components';
import type { Holiday } from '@hubtack/contracts/settings/holidays.js';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Failed, Loading } from '../../components/query-states';
import { holidaysQuery, useChangeHolidays } from '../../lib/holidays';
import { readHolidayLines, withDays } from './holiday-lines';

/** Days on which no weekly pattern counts: one by one, or a whole list pasted. */
export function HolidaysPart() {
  const { data, error, refetch } = useQuery(holidaysQuery);
  return (
    <section className="page-section page-narrow" aria-label="Holidays">
      <h2>Holidays</h2>
      <p>
        No weekly pattern counts on these days, so nobody is missed. A shift that is marked counts all the
        same. Figures of days that are past follow within seconds.
      </p>
      {error && !data && <Failed error={error} retry={() => void refetch()} />}
      {!data && !error && <Loading what="the holidays" />}
      {data && <Holidays list={data} />}
    </section>
  );
}

function Holidays({ list }: { list: readonly Holiday[] }) {
  const change = useChangeHolidays();
  const [text, setText] = useState('');
  const read = readHolidayLines(text);
  return (
    <>
      {list.length === 0 ? (
        <p>None yet.</p>
      ) : (
        <ul className="holidays">
          {list.map(({ day, name }) => (
            <li key={day}>
              <span>
                {day} {name}
              </span>
              <Button
                size="small"
                disabled={change.isPending}
                aria-label={`Remove ${name}`}
                onClick={() => change.mutate(list.filter((one) => one.day !== day))}
              >
                Remove
              </Button>
            </li>
          ))}
        </ul>
      )}
      <form
        onSubmit={(event) => {
          event.preventDefault();
          if (read.errors.length === 0 && read.days.length > 0)
            change.mutate(withDays(list, read.days), { onSuccess: () => setText('') });
        }}
      >
        <Field
          label="Add days"
          hint="One a line: 2026-12-25, Christmas Day. A list from a spreadsheet can be pasted."
          {...(read.errors.length > 0
            ? {
                validationState: 'error' as const,
                validationMessage: read.errors
                  .map(({ line, detail }) => `Line ${line}: ${detail}.`)
                  .join(' '),
              }
            : {})}
        >
          <Textarea value={text} rows={3} onChange={(_, { value }) => setText(value)} />
        </Field>
        {change.error && (
          <MessageBar intent="error">
            <MessageBarBody>{change.error.message}</MessageBarBody>
          </MessageBar>
        )}
        <div className="form-buttons">
          <Button
            type="submit"
            disabled={read.days.length === 0 || read.errors.length > 0 || change.isPending}
          >
            Add {read.days.length > 0 ? read.days.length : ''}
          </Button>
        </div>
      </form>
    </>
  );
}
