import { useQuery } from '@tanstack/react-query';
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
import { epochsQuery } from '../lib/epochs';
import { Empty, Failed, Loading } from './query-states';
import './epoch-charts.css';

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
      : `between ${Math.min(...values).toFixed(0)} and ${Math.max(...values).toFixed(0)}, now ${values.at(-1)!.toFixed(1)}`;
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

interface EpochChartsProps {
  roverId: number;
  from: number;
  /** Null: to now, and on. */
  to: number | null;
  zone: string;
  /** Drawn as a line: where the fix was lost. */
  mark?: number;
  maxAgeSeconds?: number;
  withHdop?: boolean;
}

/** Age of corrections over satellites (and HDOP): which of them changed first tells the cause. */
export default function EpochCharts(props: EpochChartsProps) {
  const { roverId, from, to, zone, mark, maxAgeSeconds = 10, withHdop = false } = props;
  const { data, error, refetch } = useQuery(epochsQuery(roverId, from, to));
  if (error && !data) return <Failed error={error} retry={() => void refetch()} />;
  if (!data) return <Loading what="the charts" />;
  if (data.points.length === 0)
    return (
      <Empty title="Nothing heard in this time">Charts need epochs; raw ones are kept for some weeks.</Empty>
    );
  const points = withGaps(
    data.points.map(({ at, satellites, ageMs, hdop }) => ({
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
