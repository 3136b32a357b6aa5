import { holidays, type Holiday } from '@hubtack/contracts/settings/holidays.js';
import { queryOptions } from '@tanstack/react-query';
import { api } from './api';
import { useChange } from './use-change';

export const holidaysQuery = queryOptions({
  queryKey: ['holidays'],
  queryFn: () => api(holidays, 'GET', '/api/holidays'),
});

export const useChangeHolidays = () =>
  useChange((body: Holiday[]) => api(holidays, 'PUT', '/api/holidays', body), [holidaysQuery.queryKey]);
