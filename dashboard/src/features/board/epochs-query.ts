import { epochSeries } from '@hubtack/contracts/fixes/timeline.js';
import { queryOptions } from '@tanstack/react-query';
import { api } from '../../lib/api';

const EVERY_MS = 10_000;
const WINDOW_MS = 2 * 3_600_000;

/** The last two hours of a rover, for the charts of its panel. */
export const epochsQuery = (roverId: number) =>
  queryOptions({
    queryKey: ['rover', roverId, 'epochs'],
    refetchInterval: EVERY_MS,
    queryFn: async () => {
      const now = Date.now();
      const window = new URLSearchParams({
        from: new Date(now - WINDOW_MS).toISOString(),
        to: new Date(now + 60_000).toISOString(),
      });
      return api(epochSeries, 'GET', `/api/rovers/${roverId}/epochs?${window}`);
    },
  });
