import {
  correctionCheck,
  correctionCheckList,
  type CorrectionCheck,
  type StartCheckBody,
} from '@hubtack/contracts/corrections/check.js';
import {
  correctionSource,
  correctionSourceList,
  type CorrectionSource,
  type CorrectionSourceBody,
} from '@hubtack/contracts/corrections/correction-source.js';
import { mountPointList } from '@hubtack/contracts/corrections/mount-point.js';
import { keepPreviousData, queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect } from 'react';
import { api, apiVoid } from './api';
import { roversQuery } from './rovers';
import { useChange } from './use-change';

const REREAD_MS = 30_000;
const RUNNING_MS = 500;

export const correctionSourcesQuery = queryOptions({
  queryKey: ['correctionSources'],
  // Checks on a timetable change what is said of a source.
  refetchInterval: REREAD_MS,
  queryFn: () => api(correctionSourceList, 'GET', '/api/correction-sources'),
});
export const correctionSourceQuery = (id: number) =>
  queryOptions({
    queryKey: ['correctionSources', id],
    refetchInterval: REREAD_MS,
    queryFn: () => api(correctionSource, 'GET', `/api/correction-sources/${id}`),
  });
export const correctionChecksQuery = (id: number) =>
  queryOptions({
    queryKey: ['correctionChecks', id],
    refetchInterval: REREAD_MS,
    queryFn: () => api(correctionCheckList, 'GET', `/api/correction-sources/${id}/checks`),
  });
const correctionCheckQuery = (id: number, checkId: number) =>
  queryOptions({
    queryKey: ['correctionCheck', checkId],
    queryFn: () => api(correctionCheck, 'GET', `/api/correction-sources/${id}/checks/${checkId}`),
    refetchInterval: ({ state }) => (state.data?.status === 'running' ? RUNNING_MS : false),
  });

const searchOf = (place: StartCheckBody): string =>
  new URLSearchParams(Object.entries(place).map(([name, id]) => [name, String(id)])).toString();

/** Reading it is a visit to the caster, so it is read when somebody asks and not by itself. */
export const mountPointsQuery = (source: CorrectionSource, place: StartCheckBody) =>
  queryOptions({
    queryKey: ['mountPoints', source.id, source.address, source.port, place],
    staleTime: Infinity,
    // Another place changes the distances only: the list stays while they are on their way.
    placeholderData: keepPreviousData,
    retry: false,
    refetchOnReconnect: false,
    queryFn: () =>
      api(mountPointList, 'GET', `/api/correction-sources/${source.id}/mount-points?${searchOf(place)}`),
  });

const touches = [correctionSourcesQuery.queryKey, roversQuery.queryKey];
export const useAddCorrectionSource = () =>
  useChange(
    (body: CorrectionSourceBody) => api(correctionSource, 'POST', '/api/correction-sources', body),
    touches,
  );
export const useChangeCorrectionSource = (id: number) =>
  useChange(
    (body: CorrectionSourceBody) => api(correctionSource, 'PUT', `/api/correction-sources/${id}`, body),
    touches,
  );

/** A check of a source, read anew while it runs; when it ends, what is said of the source is read anew too. */
export function useCorrectionCheck(id: number, checkId: number) {
  const client = useQueryClient();
  const query = useQuery(correctionCheckQuery(id, checkId));
  const status = query.data?.status;
  useEffect(() => {
    if (status === undefined || status === 'running') return;
    const list = client.getQueryData(correctionChecksQuery(id).queryKey);
    if (list?.checks.find((one) => one.id === checkId)?.status !== 'running') return;
    void client.invalidateQueries({ queryKey: correctionChecksQuery(id).queryKey });
    void client.invalidateQueries({ queryKey: correctionSourcesQuery.queryKey });
  }, [client, id, checkId, status]);
  return query;
}

/** Starts a check; also when one runs already, the list is read anew, so that the running one is shown. */
export function useStartCheck(id: number) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (place: StartCheckBody) =>
      api(correctionCheck, 'POST', `/api/correction-sources/${id}/checks`, place),
    onSuccess: (started: CorrectionCheck) =>
      client.setQueryData(correctionCheckQuery(id, started.id).queryKey, started),
    onSettled: () => client.invalidateQueries({ queryKey: correctionChecksQuery(id).queryKey }),
  });
}

export function useCancelCheck(id: number, checkId: number) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => apiVoid('DELETE', `/api/correction-sources/${id}/checks/${checkId}`),
    onSettled: () => client.invalidateQueries({ queryKey: correctionCheckQuery(id, checkId).queryKey }),
  });
}
