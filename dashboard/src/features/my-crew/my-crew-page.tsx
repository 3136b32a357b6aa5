import { useEffect } from 'react';
import { Empty, Failed, Loading } from '../../components/query-states';
import { clockTime } from '../../lib/format';
import { crewDayPath } from '../../lib/my-crew';
import { setUpStartPath } from '../../lib/set-up';
import { useMe } from '../../lib/session';
import { useTaps } from '../../offline/use-taps';
import { worker } from '../../offline/worker';
import { AdviceList } from './advice-list';
import { DayRibbons } from './day-ribbons';
import { LostFixList } from './lost-fix-list';
import { NewVersion } from './new-version';
import { RoverPanel } from './rover-panel';
import { ShiftButtons } from './shift-buttons';
import { ShiftLine } from './shift-line';
import { shiftNow } from './shift-now';
import { TapList } from './tap-list';
import { useLostFixes } from './use-lost-fixes';
import { useMyCrew } from './use-my-crew';
import { useTapAnswers } from './use-tapping';
import { waitingSteps } from './waiting-steps';
import './my-crew.css';

/** The chief's page: how the fix stands, one button to say that it does not, what the office answered, and the shift. */
export default function MyCrewPage() {
  const { crewId } = useMe();
  if (crewId === null)
    return (
      <Empty title="You have no crew">
        This page is for the chief of a crew. The office gives you one under Users.
      </Empty>
    );
  return <MyCrew crewId={crewId} />;
}

function MyCrew({ crewId }: { crewId: number }) {
  const { timeZone, userId } = useMe();
  const crew = useMyCrew(crewId);
  const { now, day, rovers, hasNoSignal, asOf } = crew;
  const own = useTaps(userId);
  const lostFixes = useLostFixes(day, crewId);
  useTapAnswers(crewId);
  const setUpPaths = rovers.map(({ id }) => setUpStartPath(id)).join(' ');
  useEffect(
    () =>
      worker.keep([
        '/api/auth/me',
        crewDayPath(crewId),
        ...setUpPaths.split(' ').filter((path) => path !== ''),
      ]),
    [crewId, setUpPaths],
  );
  const shift = shiftNow(day, waitingSteps(own.waiting));

  if (crew.isLoading) return <Loading what="your crew" />;
  return (
    <div className="my-crew">
      <NewVersion />
      <header className="my-crew-head">
        <h1>{crew.name === 'My crew' ? crew.name : `Crew ${crew.name}`}</h1>
        <span>{crew.siteName}</span>
      </header>
      <p className="my-crew-signal" role="status" data-shown={hasNoSignal}>
        {hasNoSignal && (asOf === null ? 'No signal.' : `As of ${clockTime(asOf, timeZone)}, no signal.`)}
      </p>
      {crew.error && <Failed error={crew.error} retry={() => void crew.refetch()} />}
      <div className="my-crew-columns">
        <section aria-label="Now">
          {rovers.map((rover) => (
            <RoverPanel
              key={rover.id}
              rover={rover}
              now={now}
              crewId={crewId}
              isAlone={rovers.length === 1}
            />
          ))}
          {rovers.length === 0 && !crew.error && (
            <Empty title="Your crew has no rover today">The office assigns one.</Empty>
          )}
          <TapList {...own} zone={timeZone} />
          <AdviceList lostFixes={lostFixes} zone={timeZone} />
          <ShiftLine shift={shift} day={day} zone={timeZone} />
          <ShiftButtons crewId={crewId} shift={shift} />
        </section>
        <section aria-label="Today">
          {day && <DayRibbons day={day} now={asOf ?? now} zone={timeZone} />}
          <LostFixList lostFixes={lostFixes} now={asOf ?? now} zone={timeZone} />
        </section>
      </div>
      <p className="caution">
        Fixed is the receiver’s own claim: check into known control. Quiet does not mean safe; lone-work and
        traffic rules of the place come first.
      </p>
    </div>
  );
}
