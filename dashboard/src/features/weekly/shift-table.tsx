import { Button } from '@fluentui/react-components';
import { wholeOf } from '@hubtack/contracts/fixes/totals.js';
import type { WeekShift, Weekly } from '@hubtack/contracts/weekly/weekly.js';
import { useMemo, useState } from 'react';
import { Link } from 'react-router-dom';
import { clockTime, duration, hours } from '../../lib/format';
import { percent } from '../../lib/percent';
import { money } from './money';
import { sortShifts, type SortColumn } from './sort-shifts';
import '../../components/data-table.css';

const basisWords = { marks: 'marked', pattern: 'by pattern', noShiftSet: 'no shift set' } as const;

interface Column {
  name: string;
  sort: SortColumn | null;
  cell: (shift: WeekShift) => React.ReactNode;
}

function columnsOf({ timeZone, currency }: Weekly): Column[] {
  const of = (ms: number) => (ms === 0 ? '–' : hours(ms));
  return [
    {
      name: 'Day',
      sort: 'day',
      cell: ({ day, crewId }) => <Link to={`/crews/${crewId}/days/${day}`}>{day}</Link>,
    },
    { name: 'Crew', sort: 'crew', cell: ({ crewName }) => crewName },
    { name: 'Rover', sort: 'rover', cell: ({ roverLabel }) => roverLabel },
    {
      name: 'Shift',
      sort: null,
      cell: ({ start, end, basis }) => (
        <>
          {clockTime(start, timeZone)} – {end === null ? 'now' : clockTime(end, timeZone)}{' '}
          <small>{basisWords[basis]}</small>
        </>
      ),
    },
    { name: 'On shift', sort: 'onShift', cell: ({ figures }) => of(wholeOf(figures.totals)) },
    {
      name: 'Uptime',
      sort: 'uptime',
      cell: ({ figures }) => percent(figures.totals.fixedMs, wholeOf(figures.totals)),
    },
    { name: 'Float', sort: 'float', cell: ({ figures }) => of(figures.totals.floatMs) },
    { name: 'Code only', sort: 'code', cell: ({ figures }) => of(figures.totals.codeMs) },
    { name: 'No position', sort: 'none', cell: ({ figures }) => of(figures.totals.noneMs) },
    { name: 'Quiet', sort: 'silent', cell: ({ figures }) => of(figures.totals.silentMs) },
    { name: 'Lost fixes', sort: 'lostFixes', cell: ({ figures }) => figures.lostFixes },
    {
      name: 'First fix after',
      sort: null,
      cell: ({ figures }) => (figures.firstFix.meanMs === null ? '–' : duration(figures.firstFix.meanMs)),
    },
    {
      name: 'Paid without a fix',
      sort: 'without',
      cell: ({ figures }) =>
        figures.cost === null
          ? of(figures.paidWithoutFixMs)
          : `${of(figures.paidWithoutFixMs)}, ${money(figures.cost, currency)}`,
    },
  ];
}

/** Every rover-shift of the week, sorted by whatever is clicked. */
export function ShiftTable({ data }: { data: Weekly }) {
  const [sort, setSort] = useState<{ by: SortColumn; isDown: boolean }>({ by: 'day', isDown: false });
  const rows = useMemo(() => sortShifts(data.shifts, sort.by, sort.isDown), [data.shifts, sort]);
  return (
    <section aria-label="Every shift" className="week-shifts">
      <h2>Every shift</h2>
      <div className="weekly-scroll">
        <table className="data-table">
          <thead>
            <tr>
              {columnsOf(data).map(({ name, sort: by }) => (
                <th
                  key={name}
                  scope="col"
                  aria-sort={sort.by === by ? (sort.isDown ? 'descending' : 'ascending') : undefined}
                >
                  {by === null ? (
                    name
                  ) : (
                    <Button
                      appearance="transparent"
                      size="small"
                      onClick={() =>
                        setSort((before) => ({ by, isDown: before.by === by && !before.isDown }))
                      }
                    >
                      {name} {sort.by === by ? (sort.isDown ? '↓' : '↑') : ''}
                    </Button>
                  )}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((shift) => (
              <tr key={`${shift.roverId} ${shift.crewId} ${shift.start}`}>
                {columnsOf(data).map(({ name, cell }) => (
                  <td key={name} data-name={name}>
                    {cell(shift)}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </section>
  );
}
