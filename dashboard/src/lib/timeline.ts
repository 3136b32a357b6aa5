import { timelineAnswer } from '@hubtack/contracts/fixes/timeline.js';
import { queryOptions } from '@tanstack/react-query';
import { api } from './api';

const EVERY_MS = 5000;

/** Spans of a rover from `from` to `to`, or to now and on. */
export const timelineQuery = (roverId: number, from: number, to: number | null) =>
  queryOptions({
    queryKey: ['rover', roverId, 'timeline', from, to],
    refetchInterval: to === null ? EVERY_MS : false,
    queryFn: async () => {
      const window = new URLSearchParams({
        from: new Date(from).toISOString(),
        to: new Date(to ?? Date.now()).toISOString(),
      });
      const { spans } = await api(timelineAnswer, 'GET', `/api/rovers/${roverId}/timeline?${window}`);
      return spans.map(({ state, start, end }) => ({
        state,
        start: Date.parse(start),
        end: Date.parse(end),
      }));
    },
  });
