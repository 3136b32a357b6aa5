import {
  ground,
  setUpCard,
  setUpCardList,
  setUpStart,
  type MeasuringPoint,
  type SetUpCard,
  type SetUpCardBody,
} from '@hubtack/contracts/set-up/set-up-card.js';
import { queryOptions } from '@tanstack/react-query';
import { api } from './api';

export const setUpPath = '/api/set-up-cards';
export const setUpStartPath = (roverId: number): string => `${setUpPath}/start?roverId=${roverId}`;

const key = ['setUpCards'] as const;

export const setUpStartQuery = (roverId: number) =>
  queryOptions({
    queryKey: [...key, 'start', roverId],
    queryFn: () => api(setUpStart, 'GET', setUpStartPath(roverId)),
  });

export const setUpCardsQuery = (roverId: number) =>
  queryOptions({
    queryKey: [...key, roverId],
    queryFn: () => api(setUpCardList, 'GET', `${setUpPath}?roverId=${roverId}`).then(({ cards }) => cards),
  });

export interface Pole {
  poleHeightM: number;
  antennaOffsetM: number;
  measuringPoint: MeasuringPoint;
}
const GROUND_MS = 3000;

/** Height of the ground under the pole, by the rover's newest sentence. */
export const groundQuery = (roverId: number, pole: Pole) =>
  queryOptions({
    queryKey: [...key, 'ground', roverId, pole],
    refetchInterval: GROUND_MS,
    queryFn: () => {
      const { poleHeightM, antennaOffsetM, measuringPoint } = pole;
      const asked = new URLSearchParams({
        roverId: String(roverId),
        poleHeightM: String(poleHeightM),
        antennaOffsetM: String(antennaOffsetM),
        measuringPoint,
      });
      return api(ground, 'GET', `${setUpPath}/ground?${asked.toString()}`);
    },
  });

export const setUpKey = key;
/** `tapId`: however often it is sent, it is kept once. */
export const sendSetUpCard = (body: SetUpCardBody, tapId: string): Promise<SetUpCard> =>
  api(setUpCard, 'POST', setUpPath, body, { 'idempotency-key': tapId });
