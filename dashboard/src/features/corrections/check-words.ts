import {
  checkStepLabels,
  type CheckOutcome,
  type CheckStep,
  type CheckStepName,
  type CorrectionCheck,
} from '@hubtack/contracts/corrections/check.js';
import type { CorrectionSource } from '@hubtack/contracts/corrections/correction-source.js';

/** The shapes of `outcome-mark.tsx`; `warned` is a pass with something odd about it. */
export type Mark = CheckOutcome | 'warned';

export const markWords: Record<Mark, string> = {
  waiting: 'Waiting',
  running: 'Looking now',
  pass: 'Passed',
  warned: 'Passed, with a warning',
  fail: 'Failed',
  skipped: 'Skipped',
};

export const markOf = ({ outcome, warnings }: Pick<CheckStep, 'outcome' | 'warnings'>): Mark =>
  outcome === 'pass' && warnings.length > 0 ? 'warned' : outcome;

export interface Verdict {
  mark: Mark;
  words: string;
}

const failedWords = (step: CheckStepName | null): string =>
  step === null ? 'failed' : `failed at “${checkStepLabels[step]}”`;

type Ended = Pick<CorrectionCheck, 'status' | 'passed' | 'failedStep'>;

/** What a check came to, without its time. */
export function verdictOf({ status, passed, failedStep }: Ended): Verdict {
  if (status === 'running') return { mark: 'running', words: 'running' };
  if (status === 'cancelled') return { mark: 'skipped', words: 'cancelled' };
  return passed ? { mark: 'pass', words: 'passed' } : { mark: 'fail', words: failedWords(failedStep) };
}

/** What is known of a source, in a line; `timeOf` writes an instant in the firm's time, with "at" or "on". */
export function sourceVerdict(
  { lastCheck, downSince }: Pick<CorrectionSource, 'lastCheck' | 'downSince'>,
  timeOf: (instant: string) => string,
): Verdict {
  if (lastCheck?.status === 'running') return { mark: 'running', words: 'being checked now' };
  if (downSince !== null) {
    const step = lastCheck?.failedStep;
    const where = step ? `, ${failedWords(step)}` : '';
    return { mark: 'fail', words: `down since ${timeOf(downSince).replace(/^(at|on) /, '')}${where}` };
  }
  if (lastCheck === null) return { mark: 'waiting', words: 'never checked' };
  const { mark, words } = verdictOf(lastCheck);
  return { mark, words: `${words} ${timeOf(lastCheck.at)}` };
}

/** What is said aloud while a check goes on: the step that ended last, then how it all ended. */
export function announcement(check: Ended & Pick<CorrectionCheck, 'steps'>): string {
  const ended = check.steps.findLast(({ outcome }) => outcome === 'pass' || outcome === 'fail');
  const step = ended ? `${checkStepLabels[ended.step]}: ${markWords[markOf(ended)].toLowerCase()}.` : '';
  if (check.status === 'running') return step;
  const end = check.status === 'cancelled' ? 'was cancelled' : verdictOf(check).words;
  return `${step} The check ${end}.`.trim();
}

/** 7 ms, 1.4 s. */
export const tookWords = (ms: number): string => (ms < 1000 ? `${ms} ms` : `${(ms / 1000).toFixed(1)} s`);

const capital = (words: string): string => words.charAt(0).toUpperCase() + words.slice(1);
export const capitalised = ({ mark, words }: Verdict): Verdict => ({ mark, words: capital(words) });
export const asSentence = (words: string): string => capital(words).replace(/([^.?!])$/, '$1.');
