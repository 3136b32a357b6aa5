import {
  checkShot,
  checkShotList,
  checkShotResult,
  type CheckShotBody,
} from '@hubtack/contracts/set-up/check-shot.js';
import { queryOptions, useMutation } from '@tanstack/react-query';
import { api } from './api';
import { useChange } from './use-change';

const key = ['checkShots'] as const;
const read = (asked: string) =>
  api(checkShotList, 'GET', `/api/check-shots?${asked}`).then(({ checkShots }) => checkShots);

export const checkShotsOfRoverQuery = (roverId: number) =>
  queryOptions({ queryKey: [...key, 'rover', roverId], queryFn: () => read(`roverId=${roverId}`) });
/** Of a local day, YYYY-MM-DD. */
export const checkShotsOfDayQuery = (date: string) =>
  queryOptions({ queryKey: [...key, 'day', date], queryFn: () => read(`date=${date}`) });

export const usePreviewCheckShot = () =>
  useMutation({
    mutationFn: (body: CheckShotBody) => api(checkShotResult, 'POST', '/api/check-shots/preview', body),
  });
export const useAddCheckShot = () =>
  useChange((body: CheckShotBody) => api(checkShot, 'POST', '/api/check-shots', body), [key]);
