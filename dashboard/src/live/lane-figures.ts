import type { Lane } from '@hubtack/contracts/board/lane.js';
import type { FixState } from '@hubtack/contracts/fixes/fix-state.js';
import type { StateTotals } from '@hubtack/contracts/fixes/timeline.js';
import { totalOf } from '@hubtack/contracts/fixes/totals.js';

/** State now: without another epoch a rover is silent from `heldUntil` on, whether or not the server has said so yet. */
export function stateNow(lane: Lane, now: number): { state: FixState; since: number | null } {
  if (lane.state !== 'silent' && lane.heldUntil !== null && now >= lane.heldUntil)
    return { state: 'silent', since: lane.heldUntil };
  return { state: lane.state, since: lane.since };
}

/** Today's totals, carried on from `todayAsOf` by the state that has lasted since. */
export function totalsNow(lane: Lane, now: number): StateTotals {
  const totals = { ...lane.today };
  const grows = lane.duty === 'onShift' || (lane.duty === 'noShiftSet' && lane.state !== 'silent');
  if (!grows || now <= lane.todayAsOf) return totals;
  const heldUntil = lane.state === 'silent' ? lane.todayAsOf : Math.min(now, lane.heldUntil ?? now);
  totals[totalOf[lane.state]] += Math.max(0, heldUntil - lane.todayAsOf);
  if (lane.duty === 'onShift') totals.silentMs += Math.max(0, now - Math.max(heldUntil, lane.todayAsOf));
  return totals;
}
