import type { CheckShot } from '@hubtack/contracts/set-up/check-shot.js';
import { clockTime, dayAndTime, utc } from '../lib/format';
import { inMillimetres, millimetres } from '../lib/set-up-words';
import { DataTable } from './data-table';
import './check-shot-table.css';

interface CheckShotTableProps {
  label: string;
  shots: readonly CheckShot[];
  zone: string;
  /** One day's need no date, one rover's no name. */
  of: 'day' | 'rover';
}

const spread = ({ scatter }: CheckShot): string =>
  scatter === null
    ? '–'
    : [scatter.eastM, scatter.northM, scatter.upM]
        .map((metres) => (metres === null ? '–' : (metres * 1000).toFixed(0)))
        .join(' / ');

/** Checks into control with everything that they rest on. */
export function CheckShotTable({ label, shots, zone, of }: CheckShotTableProps) {
  const time = of === 'day' ? clockTime : dayAndTime;
  const who = {
    name: 'Rover, crew',
    cell: ({ roverLabel, crewName }: CheckShot) => [roverLabel, crewName].filter(Boolean).join(', '),
  };
  return (
    <DataTable
      label={label}
      rows={shots}
      rowKey={({ id }) => id}
      columns={[
        {
          name: 'Time',
          cell: ({ at }) => <span title={utc(Date.parse(at))}>{time(Date.parse(at), zone)}</span>,
        },
        ...(of === 'day' ? [who] : []),
        {
          name: 'Control point',
          cell: ({ controlPointName, datum }) => (
            <>
              {controlPointName}
              {datum && <small className="check-shot-more">{datum}</small>}
            </>
          ),
        },
        {
          name: 'Result',
          cell: ({ passed, horizontalM, horizontalLimitM, verticalLimitM }) => (
            <>
              <strong className="check-shot-result" data-passed={passed}>
                {passed ? 'Passed' : 'Failed'}
              </strong>
              <small className="check-shot-more">
                {inMillimetres(horizontalM)} of {inMillimetres(horizontalLimitM)} in plan,{' '}
                {inMillimetres(verticalLimitM)} in height
              </small>
            </>
          ),
        },
        { name: 'East', figure: true, cell: ({ difference }) => millimetres(difference.eastM) },
        { name: 'North', figure: true, cell: ({ difference }) => millimetres(difference.northM) },
        {
          name: 'Up',
          figure: true,
          cell: ({ difference }) => (difference.upM === null ? 'not compared' : millimetres(difference.upM)),
        },
        {
          name: 'From',
          cell: (shot) => (
            <>
              {shot.epochs === null ? 'typed' : `${shot.epochs} epochs`}
              {shot.scatter && <small className="check-shot-more">scatter {spread(shot)} mm</small>}
            </>
          ),
        },
        {
          name: 'Base',
          cell: ({ mountPoint, stationId }) => (
            <>
              {mountPoint ?? '–'}
              {stationId !== null && <small className="check-shot-more">station {stationId}</small>}
            </>
          ),
        },
        {
          name: 'Pole',
          figure: true,
          cell: ({ poleHeightM }) => (poleHeightM === null ? '–' : `${poleHeightM.toFixed(3)} m`),
        },
        {
          name: 'By',
          cell: ({ by, note }) => (
            <>
              {by}
              {note && <small className="check-shot-more">{note}</small>}
            </>
          ),
        },
      ]}
    />
  );
}
