import type { Lane } from '@hubtack/contracts/board/lane.js';
import { fixStateWords } from '@hubtack/contracts/fixes/fix-state.js';
import { useQuery } from '@tanstack/react-query';
import { Empty } from '../../components/query-states';
import { StateGlyph } from '../../components/state-glyph';
import { stateNow } from '../../live/lane-figures';
import { useServerNow } from '../../live/use-lanes';
import { distance } from '../../lib/format';
import { useMe } from '../../lib/session';
import { sitesQuery } from '../../lib/sites';
import { planScale, scaleBarMetres, type Place } from './plan-scale';

const WIDTH = 1000;
const HEIGHT = 620;
const MARGIN = 60;
const LONGEST_BAR = 220;
const GLYPH = 22;

const isPlaced = <T extends { latitude: number | null; longitude: number | null }>(
  one: T,
): one is T & Place => one.latitude !== null && one.longitude !== null;

interface SitePlanProps {
  lanes: readonly Lane[];
  onOpen: (id: number) => void;
}

/** The crews and sites on a plain plan with a scale bar. */
export default function SitePlan({ lanes, onOpen }: SitePlanProps) {
  const { data: sites = [] } = useQuery(sitesQuery);
  const { units } = useMe();
  const now = useServerNow();
  const placedLanes = lanes.filter(isPlaced);
  const placedSites = sites.filter((site) => site.active).filter(isPlaced);
  const places = [...placedLanes, ...placedSites];
  if (places.length === 0)
    return (
      <Empty title="Nothing has a place yet">
        Sites get one under Sites, rovers when they report a position.
      </Empty>
    );
  const scale = planScale(places, WIDTH, HEIGHT, MARGIN);
  const bar = scaleBarMetres(scale.perMetre, LONGEST_BAR);
  return (
    <div className="plan">
      <svg viewBox={`0 0 ${WIDTH} ${HEIGHT}`} role="group" aria-label="Plan of crews and sites">
        {placedSites.map((site) => (
          <g key={site.id} transform={`translate(${scale.x(site)} ${scale.y(site)})`}>
            <path d="M-6 5 0 -6 6 5z" fill="none" stroke="var(--ink-soft)" strokeWidth="1.4" />
            <text x="10" y="18" fontSize="14" fill="var(--ink-soft)">
              {site.name}
            </text>
          </g>
        ))}
        {placedLanes.map((lane) => {
          const { state } = stateNow(lane, now);
          const name = lane.crewName ?? lane.roverLabel;
          return (
            <g
              key={lane.id}
              role="button"
              tabIndex={0}
              aria-label={`${name}, ${fixStateWords[state]}`}
              transform={`translate(${scale.x(lane) - GLYPH / 2} ${scale.y(lane) - GLYPH / 2})`}
              onClick={() => onOpen(lane.id)}
              onKeyDown={(event) => event.key === 'Enter' && onOpen(lane.id)}
              style={{ cursor: 'pointer' }}
            >
              <StateGlyph state={state} size={GLYPH} />
              <text x={GLYPH + 6} y="8" fontSize="15" fontWeight="600" fill="var(--ink)">
                {name}
              </text>
            </g>
          );
        })}
        <g transform={`translate(${MARGIN} ${HEIGHT - 26})`} stroke="var(--ink)" strokeWidth="1.5">
          <path d={`M0 -5V0H${bar * scale.perMetre}V-5`} fill="none" />
          <text x={bar * scale.perMetre + 8} y="2" fontSize="14" fill="var(--ink)" stroke="none">
            {distance(bar, units)}
          </text>
        </g>
        <g transform={`translate(${WIDTH - 50} 60)`} fill="none" stroke="var(--ink)" strokeWidth="1.5">
          <path d="M0 14V-14M-5 -6 0 -14 5 -6" />
          <text x="-5" y="32" fontSize="14" fill="var(--ink)" stroke="none">
            N
          </text>
        </g>
      </svg>
      <p className="caution">
        Who is where, roughly: not a map. △ site; a crew is drawn at its rover’s newest reported position.
      </p>
    </div>
  );
}
