import { epochSeries } from '@hubtack/contracts/fixes/timeline.js';
import { queryOptions } from '@tanstack/react-query';
import { api } from './api';

const EVERY_MS = 10_000;

/** Satellites, age and HDOP of a rover for a chart, from `from` to `to`, or to now and on. */
export const epochsQuery = (roverId: number, from: number, to: number | null) =>
  queryOptions({
    queryKey: ['rover', roverId, 'epochs', from, to],
    refetchInterval: to === null ? EVERY_MS : false,
    queryFn: async () => {
      const window = new URLSearchParams({
        from: new Date(from).toISOString(),
        to: new Date(to ?? Date.now() + 60_000).toISOString(),
      });
      return api(epochSeries, 'GET', `/api/rovers/${roverId}/epochs?${window}`);
    },
  });
