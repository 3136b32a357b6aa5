import { Checkbox } from '@fluentui/react-components';
import type { SetUpDoubt } from '@hubtack/contracts/set-up/set-up-card.js';

interface DoubtQuestionsProps {
  /** What is asked, with the question in words. */
  asked: readonly { doubt: SetUpDoubt; words: string }[];
  confirmed: readonly SetUpDoubt[];
  onConfirm: (doubt: SetUpDoubt, isConfirmed: boolean) => void;
}

/** What looks wrong is asked about once more, each with a tick of its own. */
export function DoubtQuestions({ asked, confirmed, onConfirm }: DoubtQuestionsProps) {
  if (asked.length === 0) return null;
  return (
    <fieldset className="set-up-doubts">
      <legend>Look again</legend>
      {asked.map(({ doubt, words }) => (
        <div key={doubt} role="alert">
          <p>{words}</p>
          <Checkbox
            label="I have looked again, and it is right"
            aria-label={`${words} I have looked again, and it is right`}
            checked={confirmed.includes(doubt)}
            onChange={(_, { checked }) => onConfirm(doubt, checked === true)}
          />
        </div>
      ))}
    </fieldset>
  );
}
