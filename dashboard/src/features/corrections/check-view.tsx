import { Button } from '@fluentui/react-components';
import type { CorrectionCheck } from '@hubtack/contracts/corrections/check.js';
import type { CorrectionSource } from '@hubtack/contracts/corrections/correction-source.js';
import { Failed, Loading } from '../../components/query-states';
import { useCancelCheck, useCorrectionCheck } from '../../lib/corrections';
import { dayAndTime, duration, utc } from '../../lib/format';
import { useMe } from '../../lib/session';
import { BaseAlarms, BaseFigures } from './base-figures';
import { CheckSteps } from './check-steps';
import { announcement, capitalised, tookWords, verdictOf } from './check-words';
import { OutcomeMark } from './outcome-mark';
import { StreamFigures } from './stream-figures';
import { Suggestions } from './suggestions';

const SHORT_MS = 10_000;

interface CheckViewProps {
  source: CorrectionSource;
  checkId: number;
  mayChange: boolean;
  mayCheck: boolean;
  checkAgain: () => void;
}

/** One check, as it goes or as it went. */
export function CheckView({ source, checkId, mayChange, mayCheck, checkAgain }: CheckViewProps) {
  const { data: check, error, refetch } = useCorrectionCheck(source.id, checkId);
  if (!check)
    return error ? <Failed error={error} retry={() => void refetch()} /> : <Loading what="the check" />;
  return (
    <div className="check">
      <CheckHead source={source} check={check} mayCheck={mayCheck} />
      {error && <p role="status">What is shown may be old: {error.message} The check itself goes on.</p>}
      <p className="visually-hidden" aria-live="polite">
        {announcement(check)}
      </p>
      {check.base && <BaseAlarms base={check.base} />}
      <div className="check-columns" data-alone={check.status !== 'running' && !check.base && !check.stream}>
        <CheckSteps
          steps={check.steps}
          help={<Suggestions source={source} check={check} mayChange={mayChange} checkAgain={checkAgain} />}
        />
        <div>
          {check.base && <BaseFigures base={check.base} place={check.place} />}
          {check.stream && <StreamFigures stream={check.stream} />}
        </div>
      </div>
      {check.passed && (
        <p className="caution">
          A check proves the stream, not the position. Check into known control before and during work; the
          licensed surveyor in charge and the rules of the place decide what is acceptable.
        </p>
      )}
    </div>
  );
}

function CheckHead({
  source,
  check,
  mayCheck,
}: {
  source: CorrectionSource;
  check: CorrectionCheck;
  mayCheck: boolean;
}) {
  const { timeZone } = useMe();
  const cancel = useCancelCheck(source.id, check.id);
  const startedAt = Date.parse(check.startedAt);
  const tookMs = check.endedAt === null ? null : Date.parse(check.endedAt) - startedAt;
  const { mark, words } = capitalised(verdictOf(check));
  return (
    <div className="check-head">
      <OutcomeMark mark={mark} words={words} />
      <span className="check-when">
        <time dateTime={check.startedAt} title={utc(startedAt)}>
          {dayAndTime(startedAt, timeZone)}
        </time>
        {tookMs !== null && `, took ${tookMs < SHORT_MS ? tookWords(tookMs) : duration(tookMs)}`}
        {check.place !== null && `, for ${check.place}`}
        {check.by === null ? ', by the timetable' : `, by ${check.by}`}
      </span>
      {check.status === 'running' && mayCheck && (
        <Button disabled={cancel.isPending} onClick={() => cancel.mutate()}>
          Cancel the check
        </Button>
      )}
      {cancel.error && <span role="alert">{cancel.error.message}</span>}
    </div>
  );
}
