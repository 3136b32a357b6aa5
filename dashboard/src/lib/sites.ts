import { site, siteList, type ChangeSiteBody, type SiteBody } from '@hubtack/contracts/sites/site.js';
import { queryOptions } from '@tanstack/react-query';
import { api } from './api';
import { useChange } from './use-change';

export const sitesQuery = queryOptions({
  queryKey: ['sites'],
  queryFn: () => api(siteList, 'GET', '/api/sites'),
});

export const useAddSite = () =>
  useChange((body: SiteBody) => api(site, 'POST', '/api/sites', body), [sitesQuery.queryKey]);
export const useChangeSite = (id: number) =>
  useChange((body: ChangeSiteBody) => api(site, 'PUT', `/api/sites/${id}`, body), [sitesQuery.queryKey]);
