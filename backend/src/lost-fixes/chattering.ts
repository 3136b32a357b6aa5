const THIRD_WITHIN_MS = 10 * 60_000;
const QUIET_MS = 5 * 60_000;

/**
 * Whether a rover chatters at `now` (design: "Chattering"): from its third episode within ten minutes on, until five minutes
 * have gone by without another. `raisedAt`: instants at which its episodes were raised, in order.
 */
export function isChattering(raisedAt: readonly number[], now: number): boolean {
  let chatters = false;
  let last = -Infinity;
  for (const [index, at] of raisedAt.entries()) {
    if (at > now) break;
    if (at - last >= QUIET_MS) chatters = false;
    const third = raisedAt[index - 2];
    if (third !== undefined && at - third <= THIRD_WITHIN_MS) chatters = true;
    last = at;
  }
  return chatters && now - last < QUIET_MS;
}
