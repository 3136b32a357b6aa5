import { wholeOf } from '@hubtack/contracts/fixes/totals.js';
import { Button } from '@fluentui/react-components';
import { fixStateWords } from '@hubtack/contracts/fixes/fix-state.js';
import { useEffect, useRef, useState, type ReactNode } from 'react';
import { Link } from 'react-router-dom';
import EpochCharts from '../../components/epoch-charts';
import { SetUpLines } from '../../components/set-up-lines';
import { SpanRibbon } from '../../components/span-ribbon';
import { StateGlyph } from '../../components/state-glyph';
import { stateNow, totalsNow } from '../../live/lane-figures';
import { useLane, useServerNow } from '../../live/use-lanes';
import { age, clockTimeSeconds, distance, duration, utc } from '../../lib/format';
import { percent } from '../../lib/percent';
import { useMe } from '../../lib/session';
import './lane-panel.css';

const HOUR_MS = 3_600_000;

const Figure = ({ name, children, title }: { name: string; children: ReactNode; title?: string }) => (
  <div>
    <dt>{name}</dt>
    <dd title={title}>{children}</dd>
  </div>
);

/** Everything about one lane, beside the list; over it on a phone. */
export default function LanePanel({ id, onClose }: { id: number; onClose: () => void }) {
  const lane = useLane(id);
  const now = useServerNow();
  const { timeZone, units, role } = useMe();
  const heading = useRef<HTMLHeadingElement>(null);
  useEffect(() => {
    if (heading.current?.dataset.lane === String(id)) heading.current.focus();
  }, [id]);
  const [from] = useState(() => now - 2 * HOUR_MS);
  if (!lane) return null;
  const { state, since } = stateNow(lane, now);
  const totals = totalsNow(lane, now);
  const isHeard = state !== 'silent';
  const to = Math.ceil(now / 5000) * 5000;
  return (
    <aside className="panel" aria-label={`Lane of ${lane.crewName ?? lane.roverLabel}`}>
      <header>
        <StateGlyph state={state} size={40} />
        <div>
          <h2 ref={heading} tabIndex={-1} data-lane={id}>
            {lane.crewName ?? 'No crew'} <small>{lane.roverLabel}</small>
          </h2>
          <p>
            <strong style={{ color: `var(--${state}-text)` }}>{fixStateWords[state]}</strong>{' '}
            {since === null ? 'never heard' : `for ${duration(now - since)}`}
          </p>
        </div>
        <Button appearance="subtle" onClick={onClose} aria-label="Close the panel">
          Close
        </Button>
      </header>
      <SpanRibbon
        spans={lane.ribbon}
        pauses={lane.pauses}
        from={to - HOUR_MS}
        to={to}
        zone={timeZone}
        label={`Last hour of ${lane.crewName ?? lane.roverLabel}`}
      />
      <dl className="panel-figures">
        <Figure name="Satellites">{(isHeard ? lane.satellites : null) ?? '–'}</Figure>
        <Figure name="Age">{isHeard && lane.ageMs !== null ? age(lane.ageMs) : '–'}</Figure>
        <Figure name="HDOP">{isHeard && lane.hdop !== null ? lane.hdop.toFixed(1) : '–'}</Figure>
        <Figure name="Station">
          {lane.stationId === null ? '–' : String(lane.stationId).padStart(4, '0')}
        </Figure>
        <Figure name="Base">{lane.mountPoint ?? '–'}</Figure>
        <Figure name="To the base">
          {lane.baseDistanceM === null ? 'not known' : distance(lane.baseDistanceM, units)}
        </Figure>
        <Figure name="Last heard" {...(lane.lastEpochAt === null ? {} : { title: utc(lane.lastEpochAt) })}>
          {lane.lastEpochAt === null ? 'never' : clockTimeSeconds(lane.lastEpochAt, timeZone)}
        </Figure>
        <Figure name="Fix uptime today">{percent(totals.fixedMs, wholeOf(totals))}</Figure>
        <Figure name="On shift today">{duration(wholeOf(totals))}</Figure>
        <Figure name="Without a fix today">{duration(wholeOf(totals) - totals.fixedMs)}</Figure>
        <Figure name="Site">{lane.siteName ?? '–'}</Figure>
        <Figure name="Crew’s telephone">
          {lane.crewPhone ? (
            <a href={`tel:${lane.crewPhone.replace(/[^+\d]/g, '')}`}>{lane.crewPhone}</a>
          ) : (
            '–'
          )}
        </Figure>
      </dl>
      <SetUpLines lane={lane} zone={timeZone} />
      <EpochCharts roverId={id} from={from} to={null} zone={timeZone} />
      {role !== 'crewChief' && (
        <p className="panel-links">
          <Link to={`/lost-fixes?roverId=${id}`}>Lost fixes of this rover</Link>
          <Link to={`/rovers/${id}`}>Rover, keys and assignments</Link>
        </p>
      )}
    </aside>
  );
}
