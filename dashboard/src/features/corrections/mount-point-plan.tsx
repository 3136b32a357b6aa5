import type { MountPoint } from '@hubtack/contracts/corrections/mount-point.js';
import { useQuery } from '@tanstack/react-query';
import { PlainPlan } from '../../components/plain-plan';
import type { Place } from '../../components/plan-scale';
import { Empty } from '../../components/query-states';
import { distance } from '../../lib/format';
import { useMe } from '../../lib/session';
import { sitesQuery } from '../../lib/sites';
import { useLane } from '../../live/use-lanes';
import { placeOf } from './place-choice';
import { labelsThatFit, longitudeNear } from './plan-labels';

/** More than these say nothing on a plan, and are in the table. Near a place fewer do, drawn larger. */
const MOST = 150;
const MOST_NEAR = 40;
const NOWHERE = 0;

/** The place that distances are taken from, when it has a position. */
function useChosenPlace(choice: string): (Place & { name: string }) | null {
  const { siteId, roverId } = placeOf(choice);
  const { data: sites = [] } = useQuery(sitesQuery);
  const lane = useLane(roverId ?? NOWHERE);
  const site = sites.find(({ id }) => id === siteId);
  const found = site ?? lane;
  if (!found || found.latitude === null || found.longitude === null) return null;
  return {
    name: site?.name ?? lane?.roverLabel ?? '',
    latitude: found.latitude,
    longitude: found.longitude,
  };
}

interface MountPointPlanProps {
  /** In the order of the table: the first ones are drawn. */
  mountPoints: readonly MountPoint[];
  current: string;
  placeChoice: string;
  onChoose: ((chosen: MountPoint) => void) | null;
}

/** Where the bases are, as far as the source table says, on a plain plan. */
export default function MountPointPlan({ mountPoints, current, placeChoice, onChoose }: MountPointPlanProps) {
  const { units } = useMe();
  const from = useChosenPlace(placeChoice);
  const placed = mountPoints.flatMap((one) =>
    one.latitude === null || one.longitude === null
      ? []
      : [{ one, place: { latitude: one.latitude, longitude: one.longitude } }],
  );
  const middle = from?.longitude ?? placed[0]?.place.longitude;
  if (middle === undefined)
    return (
      <Empty title="None of them has a place">The source table does not say where these bases are.</Empty>
    );
  const drawn = placed.slice(0, from ? MOST_NEAR : MOST).map(({ one, place }) => ({
    one,
    place: { ...place, longitude: longitudeNear(place.longitude, middle) },
  }));
  const left = mountPoints.length - drawn.length;
  return (
    <PlainPlan
      label="Plan of mount points"
      places={[...drawn.map(({ place }) => place), ...(from ? [from] : [])]}
      units={units}
      note={
        <>
          Places are those of the source table, rounded to about a kilometre; a check reads the true one.
          Filled: in use now. △ {from ? from.name : 'the place that you choose above'}.
          {left > 0 && ` ${left} more are not drawn: too many, or without a place.`}
        </>
      }
    >
      {(scale) => {
        const fit = labelsThatFit(
          drawn.map(({ one, place }) => ({ x: scale.x(place), y: scale.y(place), text: one.mountPoint })),
        );
        return (
          <>
            {drawn.map(({ one, place }, index) => (
              <PlanPoint
                key={`${one.mountPoint} ${index}`}
                mountPoint={one}
                x={scale.x(place)}
                y={scale.y(place)}
                isNamed={fit.has(index)}
                isCurrent={one.mountPoint === current}
                words={one.distanceM === null ? '' : `, ${distance(one.distanceM, units)}`}
                onChoose={onChoose}
              />
            ))}
            {from && (
              <g transform={`translate(${scale.x(from)} ${scale.y(from)})`}>
                <path d="M-8 7 0 -8 8 7z" fill="var(--paper)" stroke="var(--ink)" strokeWidth="2" />
                <text x="12" y="-6" fontSize="15" fontWeight="600" fill="var(--ink)">
                  {from.name}
                </text>
              </g>
            )}
          </>
        );
      }}
    </PlainPlan>
  );
}

interface PlanPointProps {
  mountPoint: MountPoint;
  x: number;
  y: number;
  isNamed: boolean;
  isCurrent: boolean;
  /** How far, after its name. */
  words: string;
  onChoose: MountPointPlanProps['onChoose'];
}

function PlanPoint({ mountPoint: one, x, y, isNamed, isCurrent, words, onChoose }: PlanPointProps) {
  const name = `${one.mountPoint}${words}${isCurrent ? ', in use' : ''}`;
  const mayChoose = onChoose !== null && !isCurrent;
  return (
    <g
      transform={`translate(${x} ${y})`}
      {...(mayChoose
        ? {
            role: 'button',
            tabIndex: 0,
            'aria-label': `Choose ${name}`,
            onClick: () => onChoose(one),
            onKeyDown: (event) => (event.key === 'Enter' || event.key === ' ') && onChoose(one),
            style: { cursor: 'pointer' },
          }
        : { role: 'img', 'aria-label': name })}
    >
      <title>{name}</title>
      <circle r="14" fill="transparent" />
      <circle
        r="5"
        fill={isCurrent ? 'var(--fixed)' : 'var(--paper)'}
        stroke="var(--fixed)"
        strokeWidth="2"
      />
      {isNamed && (
        <text x="9" y="5" fontSize="14" fill="var(--ink)">
          {one.mountPoint}
        </text>
      )}
    </g>
  );
}
