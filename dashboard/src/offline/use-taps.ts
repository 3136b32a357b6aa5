import { useMemo, useSyncExternalStore } from 'react';
import { taps } from './taps';
import type { Tap } from './tap';

interface OwnTaps {
  waiting: readonly Tap[];
  refused: readonly Tap[];
  needsSignIn: boolean;
}

/** What this person tapped and the server has not yet answered for, oldest first. */
export function useTaps(userId: number | null): OwnTaps {
  const { taps: all, needsSignIn } = useSyncExternalStore(taps.subscribe, taps.getShown);
  return useMemo(() => {
    const own = all.filter((tap) => tap.userId === userId);
    const refused = own.filter(({ refusal }) => refusal !== null);
    const isUnderRefused = (tap: Tap) => refused.some(({ id }) => id === tap.under);
    return {
      waiting: own.filter((tap) => tap.refusal === null && !isUnderRefused(tap)),
      refused,
      needsSignIn,
    };
  }, [all, needsSignIn, userId]);
}
