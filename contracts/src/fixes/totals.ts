import type { FixState } from './fix-state.js';
import type { StateTotals } from './timeline.js';

/** Which total a state counts into. */
export const totalOf = {
  fixed: 'fixedMs',
  float: 'floatMs',
  code: 'codeMs',
  none: 'noneMs',
  silent: 'silentMs',
} as const satisfies Record<FixState, keyof StateTotals>;

export const noTotals = (): StateTotals => ({ fixedMs: 0, floatMs: 0, codeMs: 0, noneMs: 0, silentMs: 0 });

/** Sums of times; shares are taken of sums, never averaged. */
export function addTotals(left: StateTotals, right: StateTotals): StateTotals {
  return {
    fixedMs: left.fixedMs + right.fixedMs,
    floatMs: left.floatMs + right.floatMs,
    codeMs: left.codeMs + right.codeMs,
    noneMs: left.noneMs + right.noneMs,
    silentMs: left.silentMs + right.silentMs,
  };
}

/** All states together: the whole that shares are taken of, ms. */
export const wholeOf = (totals: StateTotals): number =>
  totals.fixedMs + totals.floatMs + totals.codeMs + totals.noneMs + totals.silentMs;
