import { wholeOf } from '@hubtack/contracts/fixes/totals.js';
import type { WeekFigures, Weekly } from '@hubtack/contracts/weekly/weekly.js';
import { duration, hours } from '../../lib/format';
import { percent } from '../../lib/percent';
import { money } from './money';

interface Line {
  name: string;
  of: (figures: WeekFigures) => string;
}

const length = (ms: number | null): string => (ms === null ? 'no data' : duration(ms));

function linesOf({ profile, currency }: Weekly): Line[] {
  const { name, maxAgeSeconds, maxHdop, minSatellites } = profile;
  const whole = ({ totals }: WeekFigures) => wholeOf(totals);
  const reporting = (figures: WeekFigures) => whole(figures) - figures.totals.silentMs;
  return [
    { name: 'Fix uptime', of: (figures) => percent(figures.totals.fixedMs, whole(figures)) },
    { name: 'Reporting', of: (figures) => percent(reporting(figures), whole(figures)) },
    { name: 'Fixed while reporting', of: (figures) => percent(figures.totals.fixedMs, reporting(figures)) },
    {
      name: `Within tolerance (${name}: age to ${maxAgeSeconds} s, HDOP to ${maxHdop}, ${minSatellites} satellites)`,
      of: (figures) => percent(figures.withinToleranceMs, whole(figures)),
    },
    { name: 'Lost fixes', of: ({ lostFixes }) => String(lostFixes) },
    { name: 'Time to regain, mean', of: ({ regain }) => length(regain.meanMs) },
    { name: 'Time to regain, 90th percentile', of: ({ regain }) => length(regain.p90Ms) },
    { name: 'Time to first fix, mean', of: ({ firstFix }) => length(firstFix.meanMs) },
    { name: 'On shift', of: (figures) => hours(whole(figures)) },
    { name: 'Paid time without a fix', of: ({ paidWithoutFixMs }) => hours(paidWithoutFixMs) },
    {
      name: 'at the crews’ hourly rates',
      of: ({ cost }) => (cost === null ? 'not known' : money(cost, currency)),
    },
  ];
}

/** The week's figures, beside those of another week when one is chosen. */
export function FiguresList({ data }: { data: Weekly }) {
  const { total, compared } = data;
  return (
    <section aria-label="Figures">
      <h2>Figures</h2>
      <table className="week-figures">
        {compared && (
          <thead>
            <tr>
              <th scope="col">
                <span className="visually-hidden">Figure</span>
              </th>
              <th scope="col">Week {Number(data.week.slice(6))}</th>
              <th scope="col">Week {Number(compared.week.slice(6))}</th>
            </tr>
          </thead>
        )}
        <tbody>
          {linesOf(data).map(({ name, of }) => (
            <tr key={name}>
              <th scope="row">{name}</th>
              <td>{of(total)}</td>
              {compared && <td>{of(compared.total)}</td>}
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}
