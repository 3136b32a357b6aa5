import type { Lane } from '@hubtack/contracts/board/lane.js';
import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { useEffect, useRef, useState } from 'react';
import { inOrderOfNeed } from './need';

/** A lane moves at most this often: a list that jumps cannot be read. */
const CALM_MS = 4000;

/**
 * Order of lanes by need, held still for a while after each move and for as long as `isHeld`: the pointer is over the
 * lanes, or one of them has the focus. New and gone lanes count at once.
 */
export function useCalmOrder(
  lanes: readonly Lane[],
  lostFixes: ReadonlyMap<number, LostFix>,
  now: number,
  isHeld: () => boolean,
): number[] {
  const [order, setOrder] = useState<number[]>(() =>
    inOrderOfNeed(lanes, lostFixes, now).map(({ id }) => id),
  );
  const movedAt = useRef(0);
  useEffect(() => {
    const wanted = inOrderOfNeed(lanes, lostFixes, now).map(({ id }) => id);
    const isSameSet = wanted.length === order.length && wanted.every((id) => order.includes(id));
    if (isSameSet && (now - movedAt.current < CALM_MS || isHeld())) return;
    if (isSameSet && wanted.every((id, index) => id === order[index])) return;
    movedAt.current = now;
    setOrder(wanted);
  }, [lanes, lostFixes, now, order, isHeld]);
  return order;
}
