import { checkStepLabels, type CheckStep } from '@hubtack/contracts/corrections/check.js';
import type { ReactNode } from 'react';
import { asSentence, markOf, markWords, tookWords } from './check-words';
import { OutcomeMark } from './outcome-mark';

/** Steps that were skipped for the same reason say it once. */
const isNews = ({ seen, outcome }: CheckStep, before: CheckStep | undefined): boolean =>
  seen !== '' && !(outcome === 'skipped' && before?.seen === seen);

interface CheckStepsProps {
  steps: readonly CheckStep[];
  /** Said under the step that failed. */
  help: ReactNode;
}

/** The walk from a name to a base position, each step with what was seen and what to try. */
export function CheckSteps({ steps, help }: CheckStepsProps) {
  return (
    <ol className="check-steps" aria-label="Steps of the check">
      {steps.map((one, index) => (
        <li
          key={one.step}
          data-outcome={one.outcome}
          aria-current={one.outcome === 'running' ? 'step' : undefined}
        >
          <div className="check-step-head">
            <strong>{checkStepLabels[one.step]}</strong>
            <OutcomeMark mark={markOf(one)} words={markWords[markOf(one)]} />
            {one.durationMs !== null && <small>{tookWords(one.durationMs)}</small>}
          </div>
          {isNews(one, steps[index - 1]) && <p>{one.seen}</p>}
          {one.toTry && (
            <p className="check-try">
              <strong>To try:</strong> {one.toTry}
            </p>
          )}
          {one.warnings.map((warning) => (
            <p key={warning} className="check-warning">
              {asSentence(warning)}
            </p>
          ))}
          {one.outcome === 'fail' && help}
        </li>
      ))}
    </ol>
  );
}
