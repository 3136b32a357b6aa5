import { weekly } from '@hubtack/contracts/weekly/weekly.js';
import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import { api } from './api';

const searchOf = (values: Record<string, string | null>): string => {
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries(values)) if (value) search.set(name, value);
  return search.size > 0 ? `?${search}` : '';
};

/** Null: this week. What is on screen stays until the next week is there. */
export const weeklyQuery = (week: string | null, compare: string | null) =>
  queryOptions({
    queryKey: ['weekly', week, compare],
    placeholderData: keepPreviousData,
    queryFn: () => api(weekly, 'GET', `/api/weekly${searchOf({ week, compare })}`),
  });

export const weeklyCsvPath = (week: string): string => `/api/weekly.csv?week=${week}`;
