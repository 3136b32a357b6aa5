import { totalOf, wholeOf } from '@hubtack/contracts/fixes/totals.js';
import { Button } from '@fluentui/react-components';
import type { StateTotals } from '@hubtack/contracts/fixes/timeline.js';
import { fixStateWords, type FixState } from '@hubtack/contracts/fixes/fix-state.js';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Bar, BarChart, CartesianGrid, ResponsiveContainer, Tooltip, XAxis, YAxis } from 'recharts';
import { StateGlyph } from '../../components/state-glyph';
import { Empty, Failed, Loading } from '../../components/query-states';
import { clockTime, duration } from '../../lib/format';
import { percent } from '../../lib/percent';
import { useMe } from '../../lib/session';
import { todayQuery } from './today-query';
import './lane-panel.css';

const order = ['fixed', 'float', 'code', 'none', 'silent'] as const satisfies FixState[];
const ROW_PX = 34;
const AXIS_PX = 50;

interface ShareRow {
  name: string;
  totals: StateTotals;
}

const shares = (row: ShareRow) => {
  const whole = wholeOf(row.totals);
  const entry: Record<string, string | number> = { name: row.name };
  for (const state of order) entry[state] = whole === 0 ? 0 : (row.totals[totalOf[state]] / whole) * 100;
  return entry;
};

function ShareChart({ rows }: { rows: ShareRow[] }) {
  return (
    <div aria-hidden>
      <ResponsiveContainer width="100%" height={rows.length * ROW_PX + AXIS_PX}>
        <BarChart
          accessibilityLayer={false}
          data={rows.map(shares)}
          layout="vertical"
          margin={{ top: 4, right: 16, bottom: 0, left: 0 }}
        >
          <CartesianGrid horizontal={false} stroke="var(--rule)" />
          <XAxis
            type="number"
            domain={[0, 100]}
            ticks={[0, 25, 50, 75, 100]}
            allowDataOverflow
            unit=" %"
            stroke="var(--ink-soft)"
            fontSize={12}
          />
          <YAxis type="category" dataKey="name" width={110} stroke="var(--ink-soft)" fontSize={13} />
          <Tooltip
            cursor={{ fill: 'var(--rule)', opacity: 0.4 }}
            contentStyle={{ background: 'var(--raised)', border: '1px solid var(--rule)' }}
            formatter={(value, name) => [`${Number(value).toFixed(1)} %`, fixStateWords[name as FixState]]}
          />
          {order.map((state) => (
            <Bar
              key={state}
              dataKey={state}
              stackId="time"
              fill={`var(--${state})`}
              stroke="var(--paper)"
              isAnimationActive={false}
            />
          ))}
        </BarChart>
      </ResponsiveContainer>
    </div>
  );
}

/** The same figures as a table: for reading out, and for whoever wants the number. */
function ShareTable({ rows, what }: { rows: ShareRow[]; what: string }) {
  return (
    <table className="figures">
      <thead>
        <tr>
          <th scope="col">{what}</th>
          <th scope="col">Fix uptime</th>
          {order.map((state) => (
            <th scope="col" key={state}>
              <StateGlyph state={state} size={14} /> {fixStateWords[state]}
            </th>
          ))}
          <th scope="col">On shift</th>
        </tr>
      </thead>
      <tbody>
        {rows.map(({ name, totals }) => (
          <tr key={name}>
            <th scope="row">{name}</th>
            <td>{percent(totals.fixedMs, wholeOf(totals))}</td>
            {order.map((state) => (
              <td key={state}>{duration(totals[totalOf[state]])}</td>
            ))}
            <td>{duration(wholeOf(totals))}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

/** Today's on-shift time by state: whole crews, or one crew hour by hour. */
export default function TodayChart() {
  const { data, error, refetch } = useQuery(todayQuery);
  const { timeZone } = useMe();
  const [crewId, setCrewId] = useState<number | null>(null);
  if (error && !data) return <Failed error={error} retry={() => void refetch()} />;
  if (!data) return <Loading what="today" />;
  const crew = data.crews.find((candidate) => candidate.crewId === crewId);
  const withTime = data.crews.filter(({ totals }) => wholeOf(totals) > 0);
  if (withTime.length === 0)
    return <Empty title="Nobody has been on shift today">The chart fills as shifts begin.</Empty>;
  const rows = crew
    ? crew.hours.map(({ start, totals }) => ({ name: clockTime(start, timeZone), totals }))
    : withTime.map(({ crewName, totals }) => ({ name: crewName, totals }));
  return (
    <section className="today" aria-label="Today by crew">
      <h2>{crew ? `${crew.crewName} today, hour by hour` : 'Today by crew: shares of on-shift time'}</h2>
      <ShareChart rows={rows} />
      <div className="today-choice" role="group" aria-label="Hour by hour">
        {crew && <Button onClick={() => setCrewId(null)}>All crews</Button>}
        {withTime.map((one) => (
          <Button
            key={one.crewId}
            size="small"
            appearance={one.crewId === crewId ? 'primary' : 'subtle'}
            onClick={() => setCrewId(one.crewId)}
          >
            {one.crewName}
          </Button>
        ))}
      </div>
      <ShareTable rows={rows} what={crew ? 'Hour from' : 'Crew'} />
    </section>
  );
}
