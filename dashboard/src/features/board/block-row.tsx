import { Link } from 'react-router-dom';
import { TakeButton } from '../../components/take-button';
import { useOpenLostFixes, useServerNow } from '../../live/use-lanes';
import { duration } from '../../lib/format';
import { useMe } from '../../lib/session';

/** One lost fix for everybody on a mount point, over the lanes that hang under it. */
export function BlockRow({ id, canAct }: { id: number; canAct: boolean }) {
  const lostFix = useOpenLostFixes().get(id);
  const now = useServerNow();
  const { role } = useMe();
  if (!lostFix) return null;
  const { mountPoint, diagnosis, taken, startAt, members, advice } = lostFix;
  const mayAct = canAct && role !== 'crewChief';
  return (
    <div className="board-block" role="row" aria-label={`Mount point ${mountPoint}`}>
      <div role="cell">
        <strong>Corrections stopped at {mountPoint}</strong> for {duration(now - startAt)}.{' '}
        {members > 0
          ? `${members} ${members === 1 ? 'crew has' : 'crews have'} lost the fix.`
          : 'No fix is lost yet.'}{' '}
        <span className="evidence">{diagnosis?.evidence.join(': ')}.</span>
        {advice && <span> Advice given: {advice.text}</span>}
      </div>
      <div className="lost-fix-actions" role="cell">
        {taken && <span>{taken.by} has it.</span>}
        {mayAct && !taken && <TakeButton id={id} />}
        {mayAct && (
          <Link className="text-button" to={`/lost-fixes/${id}`}>
            Advise
          </Link>
        )}
      </div>
    </div>
  );
}
