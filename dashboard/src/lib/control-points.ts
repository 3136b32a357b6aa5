import {
  controlPoint,
  controlPointList,
  type ChangeControlPointBody,
  type ControlPointBody,
} from '@hubtack/contracts/control-points/control-point.js';
import { queryOptions } from '@tanstack/react-query';
import { api } from './api';
import { useChange } from './use-change';

export const controlPointsQuery = queryOptions({
  queryKey: ['control-points'],
  queryFn: () => api(controlPointList, 'GET', '/api/control-points'),
});

export const useAddControlPoint = () =>
  useChange(
    (body: ControlPointBody) => api(controlPoint, 'POST', '/api/control-points', body),
    [controlPointsQuery.queryKey],
  );
export const useChangeControlPoint = (id: number) =>
  useChange(
    (body: ChangeControlPointBody) => api(controlPoint, 'PUT', `/api/control-points/${id}`, body),
    [controlPointsQuery.queryKey],
  );
