import {
  crewDay,
  shift,
  siteVisitList,
  type ShiftBody,
  type ShiftStep,
  type ShiftStepBody,
} from '@hubtack/contracts/shifts/shift.js';
import { queryOptions } from '@tanstack/react-query';
import { api, apiVoid } from './api';
import { crewDayKey } from './crew-day';
import { shiftStepPath } from './shift-steps';
import { useChange } from './use-change';

/** Today of a crew, as the office sees it. */
export const officeDayQuery = (crewId: number) =>
  queryOptions({
    queryKey: [...crewDayKey, 'office', crewId],
    queryFn: () => api(crewDay, 'GET', `/api/crews/${crewId}/day`),
  });

/** A local day of a crew, YYYY-MM-DD. */
export const crewDayOnQuery = (crewId: number, date: string) =>
  queryOptions({
    queryKey: [...crewDayKey, 'on', crewId, date],
    queryFn: () => api(crewDay, 'GET', `/api/crews/${crewId}/day?date=${date}`),
  });

/** Sites that its rovers were at on that day. */
export const siteVisitsQuery = (crewId: number, date: string) =>
  queryOptions({
    queryKey: [...crewDayKey, 'visits', crewId, date],
    queryFn: () => api(siteVisitList, 'GET', `/api/crews/${crewId}/visits?date=${date}`),
  });

const touches = [crewDayKey];
export const useShiftStep = (crewId: number) =>
  useChange(
    ({ step, ...body }: ShiftStepBody & { step: ShiftStep }) =>
      api(crewDay, 'POST', shiftStepPath(crewId, step), body),
    touches,
  );
export const useAddShift = (crewId: number) =>
  useChange((body: ShiftBody) => api(shift, 'POST', `/api/crews/${crewId}/shifts`, body), touches);
export const useChangeShift = (id: number) =>
  useChange((body: ShiftBody) => api(shift, 'PUT', `/api/shifts/${id}`, body), touches);
export const useRemoveShift = (id: number) =>
  useChange<void, void>(() => apiVoid('DELETE', `/api/shifts/${id}`), touches);
