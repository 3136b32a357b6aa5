import { percent } from '@hubtack/contracts/fixes/percent.js';
import { fixStates, fixStateWords } from '@hubtack/contracts/fixes/fix-state.js';
import type { StateTotals } from '@hubtack/contracts/fixes/timeline.js';
import { totalOf, wholeOf } from '@hubtack/contracts/fixes/totals.js';
import { oneLine } from './sheet-words.js';
import type { Bar } from './sheet.js';

/** On-shift time by state as a bar, with every share in words: colour is never alone. */
export function stateBar(name: string, totals: StateTotals, more: readonly string[]): Bar {
  const whole = wholeOf(totals);
  const parts = fixStates.map((state) => ({ state, ms: totals[totalOf[state]] }));
  const words = parts.map(({ state, ms }) => `${fixStateWords[state].toLowerCase()} ${percent(ms, whole)}`);
  return {
    label: oneLine(name),
    value: percent(totals.fixedMs, whole),
    segments: parts.map(({ state, ms }) => ({ state, share: whole === 0 ? 0 : ms / whole })),
    words: [...(whole === 0 ? [] : [words.join(', ')]), ...more],
  };
}
