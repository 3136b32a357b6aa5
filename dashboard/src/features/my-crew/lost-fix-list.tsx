import { causeLabels } from '@hubtack/contracts/lost-fixes/cause.js';
import {
  endingWords,
  flagLabels,
  lostFixKindWords,
  type LostFix,
} from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { clockTime, duration } from '../../lib/format';

const nameOf = ({ kind, flag }: LostFix): string => {
  const said = flag ? flagLabels[flag.word] : null;
  if (kind === 'flag') return said ?? lostFixKindWords.flag;
  return said === null ? lostFixKindWords[kind] : `${lostFixKindWords[kind]}, flagged: ${said.toLowerCase()}`;
};

function standing({ status, taken, ending, closed }: LostFix): string {
  switch (status) {
    case 'open':
      return 'Open, nobody has taken it yet';
    case 'taken':
      return taken ? `${taken.by} has it` : 'Taken';
    case 'ended':
      return ending ? endingWords[ending] : 'Ended';
    case 'closed':
      return closed ? `Closed: ${causeLabels[closed.cause].toLowerCase()}` : 'Closed';
  }
}

const causeOf = ({ diagnosis, closed }: LostFix): string | null =>
  diagnosis && !closed ? `Likely: ${causeLabels[diagnosis.cause].toLowerCase()}` : null;

interface LostFixListProps {
  lostFixes: readonly LostFix[];
  now: number;
  zone: string;
}

/** The day's lost fixes, newest first, and what became of them. */
export function LostFixList({ lostFixes, now, zone }: LostFixListProps) {
  return (
    <div className="crew-lost-fixes">
      <h2>Lost fixes today</h2>
      {lostFixes.length === 0 && <p>None so far.</p>}
      <ul>
        {lostFixes.map((lostFix) => (
          <li key={lostFix.id} data-open={lostFix.endAt === null && lostFix.closed === null}>
            <time dateTime={new Date(lostFix.startAt).toISOString()}>{clockTime(lostFix.startAt, zone)}</time>
            <div>
              <strong>{nameOf(lostFix)}</strong>
              <span className="crew-lost-length">
                {duration((lostFix.endAt ?? lostFix.closed?.at ?? now) - lostFix.startAt - lostFix.pausedMs)}
              </span>
              <p>{[causeOf(lostFix), standing(lostFix)].filter(Boolean).join('. ')}</p>
              {lostFix.flag?.note && <p>“{lostFix.flag.note}”</p>}
              {lostFix.photos > 0 && <p>{lostFix.photos === 1 ? '1 photo' : `${lostFix.photos} photos`}</p>}
            </div>
          </li>
        ))}
      </ul>
    </div>
  );
}
