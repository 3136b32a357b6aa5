import type { Lane } from '@hubtack/contracts/board/lane.js';
import { fixStateWords } from '@hubtack/contracts/fixes/fix-state.js';
import { useQuery } from '@tanstack/react-query';
import { PlainPlan } from '../../components/plain-plan';
import type { Place } from '../../components/plan-scale';
import { Empty } from '../../components/query-states';
import { StateGlyph } from '../../components/state-glyph';
import { stateNow } from '../../live/lane-figures';
import { useServerNow } from '../../live/use-lanes';
import { useMe } from '../../lib/session';
import { sitesQuery } from '../../lib/sites';

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
  return (
    <PlainPlan
      label="Plan of crews and sites"
      places={places}
      units={units}
      note="Who is where, roughly: not a map. △ site; a crew is drawn at its rover’s newest reported position."
    >
      {(scale) => (
        <>
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
        </>
      )}
    </PlainPlan>
  );
}
