import { Button } from '@fluentui/react-components';
import { fixStateWords } from '@hubtack/contracts/fixes/fix-state.js';
import type { FlagWord } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { useState, type ReactNode } from 'react';
import { SetUpLines } from '../../components/set-up-lines';
import { StateGlyph } from '../../components/state-glyph';
import { Link } from 'react-router-dom';
import { age, clockTime, distance, duration } from '../../lib/format';
import { useMe } from '../../lib/session';
import { FlagSheet } from './flag-sheet';
import type { RoverNow } from './rover-now';

const Figure = ({ name, children }: { name: string; children: ReactNode }) => (
  <div>
    <dt>{name}</dt>
    <dd>{children}</dd>
  </div>
);

interface RoverPanelProps {
  rover: RoverNow;
  now: number;
  crewId: number;
  /** The only rover of the crew needs no name. */
  isAlone: boolean;
}

/** One rover: its state as a word as high as a thumb, the figures behind it, and the buttons to contradict it. */
export function RoverPanel({ rover, now, crewId, isAlone }: RoverPanelProps) {
  const { timeZone, units } = useMe();
  const [sheet, setSheet] = useState<'lost' | Extract<FlagWord, 'fixLooksWrong'> | null>(null);
  const { lane, state, since, asOf } = rover;
  const heard = state === 'silent' ? null : lane;
  const sinceWords = () => {
    if (since === null) return 'not heard yet';
    return asOf === null ? `for ${duration(now - since)}` : `since ${clockTime(since, timeZone)}`;
  };
  return (
    <div className="rover-panel">
      {!isAlone && <h2>{rover.label}</h2>}
      <div className="rover-state" data-kept={asOf !== null}>
        <StateGlyph state={state} size={84} />
        <div>
          <p className="rover-word" style={{ color: `var(--${state}-text)` }}>
            {fixStateWords[state]}
          </p>
          <p>{sinceWords()}</p>
        </div>
      </div>
      <dl className="rover-figures">
        <Figure name="Satellites">{heard?.satellites ?? '–'}</Figure>
        <Figure name="Age">
          {heard?.ageMs === undefined || heard.ageMs === null ? '–' : age(heard.ageMs)}
        </Figure>
        <Figure name="HDOP">{heard?.hdop?.toFixed(1) ?? '–'}</Figure>
        <Figure name={lane?.mountPoint ? `Base ${lane.mountPoint}` : 'Base'}>
          {lane?.baseDistanceM === undefined || lane.baseDistanceM === null
            ? '–'
            : distance(lane.baseDistanceM, units)}
        </Figure>
      </dl>
      {state === 'silent' && <p className="rover-caution">Quiet does not mean safe.</p>}
      <div className="flag-buttons">
        <Button className="flag-lost" onClick={() => setSheet('lost')}>
          We lost the fix
        </Button>
        {state === 'fixed' && (
          <Button className="flag-wrong" onClick={() => setSheet('fixLooksWrong')}>
            Fix looks wrong
          </Button>
        )}
      </div>
      {lane && <SetUpLines lane={lane} zone={timeZone} />}
      <p className="rover-links">
        <Link to={`/rovers/${rover.id}/set-up`}>Set-up card</Link>
        <Link to={`/rovers/${rover.id}/check-shot`}>Check into control</Link>
      </p>
      {sheet && (
        <FlagSheet
          crewId={crewId}
          roverId={rover.id}
          word={sheet === 'lost' ? null : sheet}
          onClose={() => setSheet(null)}
        />
      )}
    </div>
  );
}
