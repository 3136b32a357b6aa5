import type { Weekly } from '@hubtack/contracts/weekly/weekly.js';
import { CartesianGrid, Line, LineChart, ResponsiveContainer, Tooltip, XAxis, YAxis } from 'recharts';
import { percent } from '../../lib/percent';

/** Fix uptime of twelve weeks. Weeks without a shift are a gap, not a nought. */
export default function WeeksLine({ weeks }: { weeks: Weekly['weeks'] }) {
  const points = weeks.map(({ week, onShiftMs, fixedMs }) => ({
    name: week.slice(5),
    uptime: onShiftMs === 0 ? null : (100 * fixedMs) / onShiftMs,
  }));
  const words = weeks.map(
    ({ week, onShiftMs, fixedMs }) => `${week.slice(5)} ${percent(fixedMs, onShiftMs)}`,
  );
  return (
    <figure className="week-line" aria-label={`Fix uptime of twelve weeks: ${words.join(', ')}`}>
      <figcaption>
        <h2>Twelve weeks</h2>
      </figcaption>
      <div aria-hidden>
        <ResponsiveContainer width="100%" height={260}>
          <LineChart
            accessibilityLayer={false}
            data={points}
            margin={{ top: 8, right: 12, bottom: 0, left: -8 }}
          >
            <CartesianGrid vertical={false} stroke="var(--rule)" />
            <XAxis dataKey="name" stroke="var(--ink-soft)" fontSize={12} />
            <YAxis
              unit=" %"
              stroke="var(--ink-soft)"
              fontSize={12}
              domain={[(low: number) => Math.floor(low / 10) * 10, 100]}
            />
            <Tooltip
              formatter={(value) => [`${Number(value).toFixed(1)} %`, 'Fix uptime']}
              contentStyle={{ background: 'var(--raised)', border: '1px solid var(--rule)' }}
            />
            <Line
              dataKey="uptime"
              stroke="var(--fixed)"
              strokeWidth={2}
              dot={{ r: 3, fill: 'var(--fixed)' }}
              isAnimationActive={false}
            />
          </LineChart>
        </ResponsiveContainer>
      </div>
    </figure>
  );
}
