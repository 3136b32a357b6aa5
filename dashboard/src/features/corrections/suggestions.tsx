import { Button, MessageBar, MessageBarActions, MessageBarBody } from '@fluentui/react-components';
import type { CorrectionCheck, SuggestedMountPoint } from '@hubtack/contracts/corrections/check.js';
import type { CorrectionSource } from '@hubtack/contracts/corrections/correction-source.js';
import { useState } from 'react';
import { useChangeCorrectionSource } from '../../lib/corrections';
import { distance } from '../../lib/format';
import { useMe } from '../../lib/session';
import { bodyOf } from './source-body';

interface SuggestionsProps {
  source: CorrectionSource;
  check: CorrectionCheck;
  mayChange: boolean;
  checkAgain: () => void;
}

/** Mount points that may have been meant, each of which can be taken over. */
export function Suggestions({ source, check, mayChange, checkAgain }: SuggestionsProps) {
  const change = useChangeCorrectionSource(source.id);
  const [taken, setTaken] = useState<string | null>(null);
  const take = (mountPoint: string) =>
    change.mutate({ ...bodyOf(source), mountPoint }, { onSuccess: () => setTaken(mountPoint) });
  // A wrong login is wrong at any other mount point too, and a position that was not sent is sent.
  if (check.failedStep === 'login' || check.failedStep === 'position') return null;
  if (check.spellings.length + check.nearest.length === 0) return null;
  const list = (title: string, mountPoints: readonly SuggestedMountPoint[]) =>
    mountPoints.length > 0 && (
      <SuggestionList
        title={title}
        mountPoints={mountPoints}
        current={source.mountPoint}
        take={mayChange ? take : null}
        isBusy={change.isPending}
      />
    );
  return (
    <section className="check-part" aria-label="Mount points that may be meant">
      <div className="suggestion-columns">
        {list('Nearest spellings', check.spellings)}
        {list(check.place === null ? 'Nearest' : `Nearest to ${check.place}`, check.nearest)}
      </div>
      {change.error && (
        <MessageBar intent="error" layout="multiline">
          <MessageBarBody>{change.error.message}</MessageBarBody>
        </MessageBar>
      )}
      {taken !== null && (
        <MessageBar intent="success" layout="multiline">
          <MessageBarBody>
            The mount point of this source is {taken} now. Set the rovers on it to the same.
          </MessageBarBody>
          <MessageBarActions>
            <Button appearance="primary" onClick={checkAgain}>
              Check again
            </Button>
          </MessageBarActions>
        </MessageBar>
      )}
    </section>
  );
}

interface SuggestionListProps {
  title: string;
  mountPoints: readonly SuggestedMountPoint[];
  current: string;
  take: ((mountPoint: string) => void) | null;
  isBusy: boolean;
}

function SuggestionList({ title, mountPoints, current, take, isBusy }: SuggestionListProps) {
  const { units } = useMe();
  return (
    <div>
      <h3>{title}</h3>
      <ul className="suggestions">
        {mountPoints.map(({ mountPoint, distanceM }) => (
          <li key={mountPoint}>
            <strong>{mountPoint}</strong>
            <span>{distanceM === null ? '' : distance(distanceM, units)}</span>
            {take &&
              (mountPoint === current ? (
                <span>in use</span>
              ) : (
                <Button
                  size="small"
                  disabled={isBusy}
                  onClick={() => take(mountPoint)}
                  aria-label={`Use ${mountPoint}`}
                >
                  Use it
                </Button>
              ))}
          </li>
        ))}
      </ul>
    </div>
  );
}
