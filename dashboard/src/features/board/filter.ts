import type { Lane } from '@hubtack/contracts/board/lane.js';
import type { FixState } from '@hubtack/contracts/fixes/fix-state.js';
import { stateNow } from '../../live/lane-figures';

export interface BoardFilter {
  text: string;
  /** Null shows all. */
  state: FixState | null;
  onlyOnShift: boolean;
}

export const noFilter: BoardFilter = { text: '', state: null, onlyOnShift: false };

export const isOnShift = (lane: Lane, now: number): boolean =>
  lane.duty === 'onShift' || (lane.duty === 'noShiftSet' && stateNow(lane, now).state !== 'silent');

/** Looks in everything a dispatcher knows a lane by. */
export function fitsFilter(lane: Lane, filter: BoardFilter, now: number): boolean {
  if (filter.state !== null && stateNow(lane, now).state !== filter.state) return false;
  if (filter.onlyOnShift && !isOnShift(lane, now)) return false;
  const wanted = filter.text.trim().toLowerCase();
  if (wanted === '') return true;
  const known = [lane.crewName, lane.roverLabel, lane.siteName, lane.mountPoint];
  return known.some((text) => text?.toLowerCase().includes(wanted));
}
