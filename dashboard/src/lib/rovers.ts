import {
  issuedRoverKey,
  rover,
  roverAssignmentList,
  roverKeyList,
  roverList,
  type AssignRoverBody,
  type ChangeRoverBody,
  type RoverBody,
} from '@hubtack/contracts/rovers/rover.js';
import { queryOptions } from '@tanstack/react-query';
import { api, apiVoid } from './api';
import { crewsQuery } from './crews';
import { useChange } from './use-change';

export const roversQuery = queryOptions({
  queryKey: ['rovers'],
  refetchInterval: 30_000,
  queryFn: () => api(roverList, 'GET', '/api/rovers'),
});
export const roverQuery = (id: number) =>
  queryOptions({ queryKey: ['rovers', id], queryFn: () => api(rover, 'GET', `/api/rovers/${id}`) });
export const roverKeysQuery = (id: number) =>
  queryOptions({
    queryKey: ['rovers', id, 'keys'],
    queryFn: () => api(roverKeyList, 'GET', `/api/rovers/${id}/keys`),
  });
export const roverAssignmentsQuery = (id: number) =>
  queryOptions({
    queryKey: ['rovers', id, 'assignments'],
    queryFn: () => api(roverAssignmentList, 'GET', `/api/rovers/${id}/assignments`),
  });

export const useAddRover = () =>
  useChange((body: RoverBody) => api(rover, 'POST', '/api/rovers', body), [roversQuery.queryKey]);
export const useChangeRover = (id: number) =>
  useChange((body: ChangeRoverBody) => api(rover, 'PUT', `/api/rovers/${id}`, body), [roversQuery.queryKey]);
export const useIssueKey = (id: number) =>
  useChange(
    (_nothing: void) => api(issuedRoverKey, 'POST', `/api/rovers/${id}/key`, {}),
    [roversQuery.queryKey],
  );
export const useRevokeKey = (id: number) =>
  useChange((keyId: number) => apiVoid('DELETE', `/api/rovers/${id}/keys/${keyId}`), [roversQuery.queryKey]);
export const useAssignRover = (id: number) =>
  useChange(
    (body: AssignRoverBody) => api(roverAssignmentList, 'POST', `/api/rovers/${id}/assignments`, body),
    [roversQuery.queryKey, crewsQuery.queryKey],
  );
