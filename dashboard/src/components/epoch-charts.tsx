import { useQuery } from '@tanstack/react-query';
import { epochsQuery } from '../lib/epochs';
import { PointCharts } from './point-charts';
import { Empty, Failed, Loading } from './query-states';

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

/** Charts of what a rover reported in a window. */
export default function EpochCharts({ roverId, from, to, ...charts }: EpochChartsProps) {
  const { data, error, refetch } = useQuery(epochsQuery(roverId, from, to));
  if (error && !data) return <Failed error={error} retry={() => void refetch()} />;
  if (!data) return <Loading what="the charts" />;
  if (data.points.length === 0)
    return (
      <Empty title="Nothing heard in this time">Charts need epochs; raw ones are kept for some weeks.</Empty>
    );
  return <PointCharts points={data.points} {...charts} />;
}
