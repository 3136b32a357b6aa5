import { causeLabels } from '@hubtack/contracts/lost-fixes/cause.js';
import { flagLabels, type LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { Link } from 'react-router-dom';
import { TakeButton } from '../../components/take-button';
import { clockTime } from '../../lib/format';

/** Likely cause with its evidence, who has it, what the chief said; and what a dispatcher can do at once. */
export function LostFixNote({ lostFix, canAct, zone }: { lostFix: LostFix; canAct: boolean; zone: string }) {
  const { diagnosis, flag, taken, id, sharedId } = lostFix;
  const isQuiet = diagnosis?.cause === 'wentQuiet' || diagnosis?.cause === 'notHeard';
  return (
    <div className="lane-note lost-fix-note">
      <p>
        {flag && (
          <strong>
            {flagLabels[flag.word]}, says the chief at {clockTime(flag.at, zone)}.{' '}
          </strong>
        )}
        {isQuiet && <strong>Call the crew. </strong>}
        {isQuiet && lostFix.crewPhone && (
          <>
            <a href={`tel:${lostFix.crewPhone.replace(/[^+\d]/g, '')}`}>{lostFix.crewPhone}</a>{' '}
          </>
        )}
        {diagnosis && lostFix.kind !== 'flag' && (
          <>
            {causeLabels[diagnosis.cause]}? <span className="evidence">{diagnosis.evidence.join(', ')}.</span>
          </>
        )}
      </p>
      {sharedId === null && (
        <p className="lost-fix-actions">
          {taken && <span>{taken.by} has it.</span>}
          {canAct && !taken && <TakeButton id={id} />}
          {canAct && (
            <Link className="text-button" to={`/lost-fixes/${id}`}>
              Advise
            </Link>
          )}
        </p>
      )}
    </div>
  );
}
