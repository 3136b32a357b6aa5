import { fixStateWords } from '@hubtack/contracts/fixes/fix-state.js';
import { antennaAboveGroundM, tiltError } from '@hubtack/contracts/set-up/pole.js';
import { useQuery } from '@tanstack/react-query';
import { useServerNow } from '../../live/use-lanes';
import { duration } from '../../lib/format';
import { groundQuery, type Pole } from '../../lib/set-up';

/** The height of the ground that the receiver makes with this pole: a mark whose height is known shows a wrong pole at once. */
export function GroundLine({ roverId, pole }: { roverId: number; pole: Pole }) {
  const now = useServerNow();
  const { data, error } = useQuery(groundQuery(roverId, pole));
  if (error) return <p className="set-up-ground">Ground height: no signal.</p>;
  if (!data || data.at === null) return <p className="set-up-ground">Ground height: nothing heard yet.</p>;
  const { aboveGeoidM, aboveEllipsoidM, state, at } = data;
  const age = duration(now - Date.parse(at));
  return (
    <p className="set-up-ground">
      Ground under the pole{' '}
      <strong>{aboveGeoidM === null ? 'not said' : `${aboveGeoidM.toFixed(3)} m`}</strong> above the geoid
      {aboveEllipsoidM !== null && `, ${aboveEllipsoidM.toFixed(3)} m above the ellipsoid`}.{' '}
      <small>
        {fixStateWords[state]}, {age} ago{state !== 'fixed' && ': wait for a fix before you trust it'}
      </small>
    </p>
  );
}

const TILTS: readonly [string, number][] = [
  ['10′', 10 / 60],
  ['30′', 0.5],
  ['1°', 1],
  ['2°', 2],
];

/** What a pole that leans costs without tilt compensation: the bubble decides, and no receiver sees it. */
export function TiltTable({ pole }: { pole: Pole }) {
  const height = antennaAboveGroundM(pole);
  return (
    <table className="set-up-tilt">
      <caption>A pole that leans, without tilt compensation, is off by</caption>
      <tbody>
        {TILTS.map(([name, degrees]) => {
          const { horizontalM, verticalM } = tiltError(height, degrees);
          return (
            <tr key={name}>
              <th scope="row">{name}</th>
              <td>{(horizontalM * 1000).toFixed(0)} mm in plan</td>
              <td>{(verticalM * 1000).toFixed(1)} mm in height</td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}
