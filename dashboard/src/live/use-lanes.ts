import type { Lane } from '@hubtack/contracts/board/lane.js';
import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { useQuery } from '@tanstack/react-query';
import { useCallback } from 'react';
import { boardQuery, type LiveBoard } from './board-query';
import { lostFixOfRover } from './lost-fix-of-rover';
import { useNow } from './use-now';

/** One lane; the component is drawn again only when this lane changes. */
export function useLane(id: number): Lane | undefined {
  const select = useCallback((board: LiveBoard) => board.lanes.get(id), [id]);
  return useQuery({ ...boardQuery, select }).data;
}

const allLanes = (board: LiveBoard) => board.lanes;
export const useLanes = () => useQuery({ ...boardQuery, select: allLanes });

const allLostFixes = (board: LiveBoard) => board.lostFixes;
const none: LiveBoard['lostFixes'] = new Map();
/** Lost fixes that have not ended and are not closed. */
export const useOpenLostFixes = (): LiveBoard['lostFixes'] =>
  useQuery({ ...boardQuery, select: allLostFixes }).data ?? none;

/** The open lost fix of a rover: one that a person has flagged before all others, else the newest. */
export function useLostFixOf(roverId: number): LostFix | undefined {
  const select = useCallback(
    (board: LiveBoard) => lostFixOfRover(board.lostFixes.values(), roverId),
    [roverId],
  );
  return useQuery({ ...boardQuery, select }).data;
}

const offset = (board: LiveBoard) => Math.round(board.clockOffsetMs / 1000) * 1000;
/** The server's "now" as this page reckons it, one second at a time. Its clock is the one that counts. */
export function useServerNow(): number {
  const { data } = useQuery({ ...boardQuery, select: offset });
  return useNow() + (data ?? 0);
}
