import { settings, shownSettings, type Settings } from '@hubtack/contracts/settings/settings.js';
import { queryOptions } from '@tanstack/react-query';
import { api } from './api';
import { meQuery } from './session';
import { useChange } from './use-change';

export const settingsQuery = queryOptions({
  queryKey: ['settings'],
  queryFn: () => api(shownSettings, 'GET', '/api/settings'),
});

export const useChangeSettings = () =>
  useChange(
    (body: Settings) => api(settings, 'PUT', '/api/settings', body),
    [settingsQuery.queryKey, meQuery.queryKey],
  );
