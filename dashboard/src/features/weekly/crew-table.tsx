import { wholeOf } from '@hubtack/contracts/fixes/totals.js';
import type { WeekCrew, Weekly } from '@hubtack/contracts/weekly/weekly.js';
import { Link } from 'react-router-dom';
import { duration, hours } from '../../lib/format';
import { percent } from '../../lib/percent';
import { money } from './money';
import { ShareBar } from './share-bar';

const weekday = (day: string): string =>
  new Date(`${day}T00:00:00Z`).toLocaleDateString('en-GB', { weekday: 'short', timeZone: 'UTC' });

/** Days on which nobody works are left out when nobody did. */
function daysShown({ crews }: Weekly): string[] {
  const days = crews[0]?.days.map(({ day }) => day) ?? [];
  return days.filter((_, index) => index < 5 || crews.some((crew) => (crew.days[index]?.onShiftMs ?? 0) > 0));
}

/** The best first: shares, day by day, lost fixes, how long it took to come back, what it cost. */
export function CrewTable({ data }: { data: Weekly }) {
  const days = daysShown(data);
  const share = ({ figures: { totals } }: WeekCrew) => totals.fixedMs / Math.max(1, wholeOf(totals));
  const crews = data.crews.toSorted((a, b) => share(b) - share(a));
  const hasCost = crews.some(({ figures }) => figures.cost !== null);
  return (
    <div className="weekly-scroll">
      <table className="week-crews" aria-label="Fix uptime by crew and day">
        <thead>
          <tr>
            <th scope="col">Crew</th>
            <th scope="col">Share of on-shift time</th>
            <th scope="col">Uptime</th>
            {days.map((day) => (
              <th key={day} scope="col" title={day}>
                {weekday(day)}
              </th>
            ))}
            <th scope="col">Lost fixes</th>
            <th scope="col">Regain, mean</th>
            <th scope="col">Without a fix</th>
            {hasCost && <th scope="col">Paid for it</th>}
          </tr>
        </thead>
        <tbody>
          {crews.map(({ crewId, crewName, figures, days: cells }) => (
            <tr key={crewId}>
              <th scope="row">{crewName}</th>
              <td>
                <ShareBar totals={figures.totals} name={crewName} />
              </td>
              <td>
                <strong>{percent(figures.totals.fixedMs, wholeOf(figures.totals))}</strong>
              </td>
              {days.map((day) => (
                <DayCell
                  key={day}
                  crewId={crewId}
                  name={crewName}
                  cell={cells.find((one) => one.day === day)}
                />
              ))}
              <td>
                <Link to={`/lost-fixes?crewId=${crewId}`}>{figures.lostFixes}</Link>
              </td>
              <td>{figures.regain.meanMs === null ? '–' : duration(figures.regain.meanMs)}</td>
              <td>{hours(figures.paidWithoutFixMs)}</td>
              {hasCost && <td>{figures.cost === null ? '–' : money(figures.cost, data.currency)}</td>}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

interface DayCellProps {
  crewId: number;
  name: string;
  cell: WeekCrew['days'][number] | undefined;
}

/** The number, with a ground that is the fuller the better: the way into the day. */
function DayCell({ crewId, name, cell }: DayCellProps) {
  if (!cell || cell.onShiftMs === 0) return <td className="week-day">–</td>;
  const share = cell.fixedMs / cell.onShiftMs;
  const shade = Math.round(Math.max(0, (share - 0.5) * 2) * 34);
  return (
    <td
      className="week-day"
      style={{ background: `color-mix(in srgb, var(--fixed) ${shade}%, transparent)` }}
    >
      <Link to={`/crews/${crewId}/days/${cell.day}`} aria-label={`${name}, ${cell.day}`}>
        {percent(cell.fixedMs, cell.onShiftMs).replace(' %', '')}
      </Link>
    </td>
  );
}
