import type { EpochSeries } from '@hubtack/contracts/fixes/timeline.js';
import {
  CartesianGrid,
  Line,
  LineChart,
  ReferenceLine,
  ResponsiveContainer,
  Tooltip,
  XAxis,
  YAxis,
} from 'recharts';
import { clockTime, clockTimeSeconds } from '../lib/format';
import './point-charts.css';

const CHART_PX = 150;
/** Between points further apart than this nothing was heard: the line breaks. */
const GAP_MS = 60_000;

interface Point {
  at: number;
  satellites: number | null;
  ageSeconds: number | null;
  hdop: number | null;
}

/** Breaks lines where the rover was silent, so that nothing is drawn that nobody measured. */
function withGaps(points: readonly Point[]): Point[] {
  return points.flatMap((point, index) => {
    const before = points[index - 1];
    if (!before || point.at - before.at < GAP_MS) return [point];
    return [{ at: before.at + 1, satellites: null, ageSeconds: null, hdop: null }, point];
  });
}

/** Small figures with a decimal, large ones and whole ones without. */
const short = (value: number): string =>
  value < 10 && !Number.isInteger(value) ? value.toFixed(1) : value.toFixed(0);

interface ChartProps {
  title: string;
  points: Point[];
  of: 'satellites' | 'ageSeconds' | 'hdop';
  zone: string;
  limit?: { at: number; words: string };
  /** Where the fix was lost. */
  mark: number | undefined;
}

function Chart({ title, points, of, zone, limit, mark }: ChartProps) {
  const values = points.map((point) => point[of]).filter((value) => value !== null);
  const words =
    values.length === 0
      ? 'nothing was reported'
      : `between ${short(Math.min(...values))} and ${short(Math.max(...values))}, last ${short(values.at(-1)!)}`;
  return (
    <figure className="panel-chart" aria-label={`${title}: ${words}`}>
      <figcaption>
        {title} <small>{words}</small>
      </figcaption>
      <div aria-hidden>
        <ResponsiveContainer width="100%" height={CHART_PX}>
          <LineChart
            accessibilityLayer={false}
            data={points}
            margin={{ top: 6, right: 8, bottom: 0, left: -18 }}
          >
            <CartesianGrid vertical={false} stroke="var(--rule)" />
            <XAxis
              dataKey="at"
              type="number"
              domain={['dataMin', 'dataMax']}
              tickFormatter={(at: number) => clockTime(at, zone)}
              stroke="var(--ink-soft)"
              fontSize={12}
              tickCount={5}
            />
            <YAxis stroke="var(--ink-soft)" fontSize={12} allowDecimals={false} domain={[0, 'auto']} />
            {limit && (
              <ReferenceLine
                y={limit.at}
                stroke="var(--float)"
                strokeDasharray="4 3"
                label={{
                  value: limit.words,
                  position: 'insideTopLeft',
                  fill: 'var(--float-text)',
                  fontSize: 12,
                }}
                ifOverflow="extendDomain"
              />
            )}
            {mark !== undefined && <ReferenceLine x={mark} stroke="var(--ink)" />}
            <Tooltip
              labelFormatter={(at) => clockTimeSeconds(Number(at), zone)}
              formatter={(value) => [Number(value).toFixed(1), title]}
              contentStyle={{ background: 'var(--raised)', border: '1px solid var(--rule)' }}
            />
            <Line
              dataKey={of}
              type="stepAfter"
              stroke="var(--fixed)"
              strokeWidth={1.6}
              dot={false}
              isAnimationActive={false}
            />
          </LineChart>
        </ResponsiveContainer>
      </div>
    </figure>
  );
}

interface PointChartsProps {
  points: EpochSeries['points'];
  zone: string;
  /** Drawn as a line: where the fix was lost. */
  mark?: number | undefined;
  maxAgeSeconds?: number;
  withHdop?: boolean;
}

/** Age of corrections over satellites (and HDOP): which of them changed first tells the cause. */
export function PointCharts({
  points: given,
  zone,
  mark,
  maxAgeSeconds = 10,
  withHdop = false,
}: PointChartsProps) {
  const points = withGaps(
    given.map(({ at, satellites, ageMs, hdop }) => ({
      at,
      satellites,
      hdop,
      ageSeconds: ageMs === null ? null : ageMs / 1000,
    })),
  );
  const limit = { at: maxAgeSeconds, words: `${maxAgeSeconds} s` };
  return (
    <>
      <Chart
        title="Age of corrections, s"
        points={points}
        of="ageSeconds"
        zone={zone}
        limit={limit}
        mark={mark}
      />
      <Chart title="Satellites" points={points} of="satellites" zone={zone} mark={mark} />
      {withHdop && <Chart title="HDOP" points={points} of="hdop" zone={zone} mark={mark} />}
    </>
  );
}
