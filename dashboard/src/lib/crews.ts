import { crew, crewList, type ChangeCrewBody, type CrewBody } from '@hubtack/contracts/crews/crew.js';
import { queryOptions } from '@tanstack/react-query';
import { api } from './api';
import { sitesQuery } from './sites';
import { useChange } from './use-change';

export const crewsQuery = queryOptions({
  queryKey: ['crews'],
  queryFn: () => api(crewList, 'GET', '/api/crews'),
});

const touches = [crewsQuery.queryKey, sitesQuery.queryKey];
export const useAddCrew = () => useChange((body: CrewBody) => api(crew, 'POST', '/api/crews', body), touches);
export const useChangeCrew = (id: number) =>
  useChange((body: ChangeCrewBody) => api(crew, 'PUT', `/api/crews/${id}`, body), touches);
