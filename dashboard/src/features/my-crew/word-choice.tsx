import { flagLabels, flagWords } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { useId } from 'react';
import { useController } from 'react-hook-form';

const offered = flagWords.filter((word) => word !== 'fixLooksWrong');

/** One choice among the chief's own words, each as large as a button. */
export function WordChoice({ name }: { name: string }) {
  const { field, fieldState } = useController({ name });
  const errorId = useId();
  const { error } = fieldState;
  return (
    <fieldset className="word-choice" aria-describedby={error ? errorId : undefined}>
      <legend>What do you see?</legend>
      {offered.map((word, index) => (
        <label key={word}>
          <input
            type="radio"
            name={name}
            value={word}
            checked={field.value === word}
            onChange={() => field.onChange(word)}
            ref={index === 0 ? field.ref : undefined}
          />
          {flagLabels[word]}
        </label>
      ))}
      {error && (
        <p id={errorId} role="alert" className="word-choice-error">
          {error.message}
        </p>
      )}
    </fieldset>
  );
}
