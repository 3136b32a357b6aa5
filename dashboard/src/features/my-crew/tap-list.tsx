import { Button } from '@fluentui/react-components';
import { Link } from 'react-router-dom';
import { clockTime } from '../../lib/format';
import type { Tap } from '../../offline/tap';
import { taps } from '../../offline/taps';

interface TapListProps {
  waiting: readonly Tap[];
  refused: readonly Tap[];
  needsSignIn: boolean;
  zone: string;
}

/** What was tapped and has not arrived: it waits, or it was refused and says why. */
export function TapList({ waiting, refused, needsSignIn, zone }: TapListProps) {
  return (
    <div className="tap-list" aria-live="polite">
      {waiting.length > 0 && (
        <div className="tap-list-block">
          <h2>Waiting to be sent</h2>
          <ul>
            {waiting.map(({ id, words, at }) => (
              <li key={id}>
                <span>{words}</span>
                <time dateTime={new Date(at).toISOString()}>{clockTime(at, zone)}</time>
              </li>
            ))}
          </ul>
          {needsSignIn && (
            <p>
              <Link to="/sign-in">Sign in</Link> and they are sent.
            </p>
          )}
        </div>
      )}
      {refused.length > 0 && (
        <div className="tap-list-block" data-refused>
          <h2>Was refused</h2>
          <ul>
            {refused.map(({ id, words, at, refusal }) => (
              <li key={id}>
                <span>
                  {words}, {clockTime(at, zone)}
                  <br />
                  {refusal}
                </span>
                <Button onClick={() => void taps.dismiss(id)} aria-label={`Dismiss: ${words}`}>
                  Dismiss
                </Button>
              </li>
            ))}
          </ul>
        </div>
      )}
    </div>
  );
}
