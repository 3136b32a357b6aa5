import { Checkbox } from '@fluentui/react-components';

interface DoubtQuestionsProps {
  /** What is asked, in words. */
  asked: readonly string[];
  confirmed: readonly string[];
  onConfirm: (words: string, isConfirmed: boolean) => void;
}

/** What looks wrong is asked about once more, each with a tick of its own. */
export function DoubtQuestions({ asked, confirmed, onConfirm }: DoubtQuestionsProps) {
  if (asked.length === 0) return null;
  return (
    <fieldset className="set-up-doubts">
      <legend>Look again</legend>
      {asked.map((words) => (
        <div key={words} role="alert">
          <p>{words}</p>
          <Checkbox
            label="I have looked again, and it is right"
            aria-label={`${words} I have looked again, and it is right`}
            checked={confirmed.includes(words)}
            onChange={(_, { checked }) => onConfirm(words, checked === true)}
          />
        </div>
      ))}
    </fieldset>
  );
}
