import { boardSnapshot } from '@hubtack/contracts/board/lane.js';
import { queryOptions } from '@tanstack/react-query';
import { api } from '../lib/api';
import { boardStateOf, type BoardState } from './board-state';

/** Where the stream goes on from, with the lanes as they stood there. */
export interface LiveBoard extends BoardState {
  cursor: string;
}

/** The snapshot; from then on the stream writes into this entry, and nothing else does. */
export const boardQuery = queryOptions({
  queryKey: ['board'],
  staleTime: Infinity,
  structuralSharing: false,
  queryFn: async (): Promise<LiveBoard> => {
    const snapshot = await api(boardSnapshot, 'GET', '/api/board');
    return { ...boardStateOf(snapshot, Date.now()), cursor: snapshot.cursor };
  },
});
