import { causeLabels } from '@hubtack/contracts/lost-fixes/cause.js';
import { endingWords, flagLabels, type LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { Link } from 'react-router-dom';
import { TakeButton } from '../../components/take-button';
import { useServerNow } from '../../live/use-lanes';
import { clockTime, dayAndTime, duration, utc } from '../../lib/format';
import { useMe } from '../../lib/session';
import { KindMark } from './kind-mark';
import { lengthMs } from './order';

/** One lost fix on the desk: what, who, how long, why, who has it, and what can be done at once. */
export function LostFixRow({ lostFix, members }: { lostFix: LostFix; members: readonly LostFix[] }) {
  const { timeZone } = useMe();
  const { id, kind, diagnosis, flag, taken, shelved, status, closed, advice } = lostFix;
  return (
    <li className="desk-row" data-status={status} data-shelved={shelved !== null}>
      <KindMark lostFix={lostFix} />
      <div className="desk-who">
        <Link to={`/lost-fixes/${id}`}>
          {kind === 'mountPoint' ? lostFix.mountPoint : (lostFix.crewName ?? 'No crew')}
        </Link>
        <small>
          {kind === 'mountPoint'
            ? `${lostFix.members} ${lostFix.members === 1 ? 'crew' : 'crews'} under it`
            : [lostFix.roverLabel, lostFix.siteName].filter(Boolean).join(', ')}
        </small>
      </div>
      <Length lostFix={lostFix} />
      <div className="desk-why">
        {flag && (
          <p>
            <strong>{flagLabels[flag.word]}</strong>
            {flag.note && `: ${flag.note}`} <small>chief, {clockTime(flag.at, timeZone)}</small>
          </p>
        )}
        {closed ? (
          <p>
            <strong>{causeLabels[closed.cause]}</strong>
            {closed.note && `: ${closed.note}`} <small>closed by {closed.by}</small>
          </p>
        ) : (
          diagnosis &&
          kind !== 'flag' && (
            <p>
              {causeLabels[diagnosis.cause]}?{' '}
              <span className="evidence">{diagnosis.evidence.join(', ')}.</span>
            </p>
          )
        )}
        {advice && !closed && (
          <p>
            Advice: {advice.text} <small>{advice.by}</small>
          </p>
        )}
        {shelved && (
          <p>
            Shelved until {clockTime(shelved.until, timeZone)} by {shelved.by}: {shelved.reason}
          </p>
        )}
        {members.length > 0 && <Members members={members} />}
      </div>
      <div className="desk-actions">
        {taken && !closed && <span>{taken.by} has it.</span>}
        {status === 'open' && <TakeButton id={id} />}
        {!closed && (
          <Link className="text-button" to={`/lost-fixes/${id}`}>
            {status === 'ended' ? 'Close' : 'Advise'}
          </Link>
        )}
      </div>
    </li>
  );
}

function Members({ members }: { members: readonly LostFix[] }) {
  return (
    <details>
      <summary>
        {members.length} {members.length === 1 ? 'lost fix' : 'lost fixes'} under it
      </summary>
      <ul>
        {members.map((member) => (
          <li key={member.id}>
            <Link to={`/lost-fixes/${member.id}`}>{member.crewName}</Link> {member.roverLabel}{' '}
            {member.endAt === null ? 'lost still' : 'regained'}
            {member.flag && `, ${flagLabels[member.flag.word].toLowerCase()}`}
          </li>
        ))}
      </ul>
    </details>
  );
}

/** Since when, and how long; only this ticks. */
function Length({ lostFix }: { lostFix: LostFix }) {
  const now = useServerNow();
  const { timeZone } = useMe();
  const { startAt, endAt, ending, closed } = lostFix;
  return (
    <div className="desk-length" title={utc(startAt)}>
      <strong>{duration(lengthMs(lostFix, now))}</strong>
      <small>
        {closed ? dayAndTime(startAt, timeZone) : `since ${clockTime(startAt, timeZone)}`}
        {endAt !== null && ending && !closed && `; ${endingWords[ending].toLowerCase()}`}
      </small>
    </div>
  );
}
