import { boardToday } from '@hubtack/contracts/board/lane.js';
import { queryOptions } from '@tanstack/react-query';
import { api } from '../../lib/api';

const EVERY_MS = 30_000;

export const todayQuery = queryOptions({
  queryKey: ['boardToday'],
  refetchInterval: EVERY_MS,
  queryFn: () => api(boardToday, 'GET', '/api/board/today'),
});
