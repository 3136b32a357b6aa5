import type { CheckShotResult } from '@hubtack/contracts/set-up/check-shot.js';
import { clockTimeSeconds, duration } from '../../lib/format';
import { inMillimetres, millimetres } from '../../lib/set-up-words';
import { useMe } from '../../lib/session';

/** How far the rover is off, by direction, against what is allowed. Shape, word and colour say whether it passed. */
export function ShotResult({ result }: { result: CheckShotResult }) {
  const { timeZone } = useMe();
  const { difference, scatter, passed, epochs, firstAt, lastAt, warnings } = result;
  const spread = (metres: number | null) => (metres === null ? '–' : `${(metres * 1000).toFixed(1)} mm`);
  return (
    <>
      <p className="set-up-verdict" data-passed={passed} role="status">
        <span aria-hidden className="set-up-verdict-mark" />
        {passed ? 'Passed' : 'Failed'}: {inMillimetres(result.horizontalM)} off in plan
        {difference.upM !== null && `, ${millimetres(difference.upM)} in height`}
      </p>
      <table className="set-up-differences">
        <thead>
          <tr>
            <th scope="col">Direction</th>
            <th scope="col">East</th>
            <th scope="col">North</th>
            <th scope="col">Up</th>
          </tr>
        </thead>
        <tbody>
          <tr>
            <th scope="row">Rover less mark</th>
            <td>{millimetres(difference.eastM)}</td>
            <td>{millimetres(difference.northM)}</td>
            <td>{difference.upM === null ? 'not compared' : millimetres(difference.upM)}</td>
          </tr>
          {scatter && (
            <tr>
              <th scope="row">Scatter of one</th>
              <td>{spread(scatter.eastM)}</td>
              <td>{spread(scatter.northM)}</td>
              <td>{spread(scatter.upM)}</td>
            </tr>
          )}
        </tbody>
      </table>
      <p>
        Allowed: {inMillimetres(result.horizontalLimitM)} in plan, {inMillimetres(result.verticalLimitM)} in
        height.
        {epochs !== null &&
          firstAt !== null &&
          lastAt !== null &&
          ` Mean of ${epochs} fixed positions over ${duration(Date.parse(lastAt) - Date.parse(firstAt))}, the last at ${clockTimeSeconds(Date.parse(lastAt), timeZone)}.`}
        {result.poleHeightM !== null && ` ${result.poleHeightM.toFixed(3)} m taken off for pole and antenna.`}
      </p>
      {warnings.map((warning) => (
        <p key={warning} className="set-up-warning">
          {warning}
        </p>
      ))}
      {!passed && (
        <p className="set-up-warning">
          <strong>What to try:</strong> look at the bubble and the mark, read the pole height again, lose the
          fix on purpose in the open and measure again, compare base and control point. If it fails again, say
          “Fix looks wrong” on the crew’s page and take no points.
        </p>
      )}
    </>
  );
}
