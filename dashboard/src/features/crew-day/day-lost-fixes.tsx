import { causeLabels } from '@hubtack/contracts/lost-fixes/cause.js';
import { endingWords, lostFixKindWords, type LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { Link } from 'react-router-dom';
import { clockTime, duration } from '../../lib/format';

/** The lost fixes of the day, in order, each the way to its own page. */
export function DayLostFixes({
  lostFixes,
  zone,
  now,
}: {
  lostFixes: readonly LostFix[];
  zone: string;
  now: number;
}) {
  const shown = lostFixes
    .filter(({ ending }) => ending !== 'withdrawn')
    .toSorted((a, b) => a.startAt - b.startAt);
  return (
    <section aria-label="Lost fixes">
      <h2>Lost fixes</h2>
      {shown.length === 0 && <p>No fix was lost for half a minute or more.</p>}
      <ul className="day-marks">
        {shown.map((lostFix) => {
          const { id, kind, startAt, endAt, pausedMs, ending, closed, diagnosis, roverLabel } = lostFix;
          const cause = closed?.cause ?? diagnosis?.cause;
          return (
            <li key={id}>
              <time>{clockTime(startAt, zone)}</time>{' '}
              <Link to={`/lost-fixes/${id}`}>
                {lostFixKindWords[kind]}, {duration((endAt ?? now) - startAt - pausedMs)}
              </Link>{' '}
              {cause && causeLabels[cause]}
              {cause && !closed && ' (likely)'}{' '}
              <small>
                {roverLabel}
                {ending && `, ${endingWords[ending].toLowerCase()}`}
              </small>
            </li>
          );
        })}
      </ul>
    </section>
  );
}
