import { totalOf, wholeOf } from '@hubtack/contracts/fixes/totals.js';
import { fixStateWords, type FixState } from '@hubtack/contracts/fixes/fix-state.js';
import type { StateTotals } from '@hubtack/contracts/fixes/timeline.js';
import { duration } from '../../lib/format';
import { percent } from '../../lib/percent';

const order = ['fixed', 'float', 'code', 'none', 'silent'] as const satisfies FixState[];
/** Height is the state here as in the ribbon: it can be told without its colour. */
const heights: Record<FixState, number> = { fixed: 22, float: 15, code: 9, none: 4, silent: 22 };

/** Shares of on-shift time by state; silence is an outline. */
export function ShareBar({ totals, name }: { totals: StateTotals; name: string }) {
  const whole = wholeOf(totals);
  if (whole === 0) return <span>no data</span>;
  const words = order
    .filter((state) => totals[totalOf[state]] > 0)
    .map((state) => `${fixStateWords[state]} ${percent(totals[totalOf[state]], whole)}`);
  return (
    <svg
      className="share-bar"
      viewBox="0 0 1000 22"
      preserveAspectRatio="none"
      role="img"
      aria-label={`${name}: ${words.join(', ')}`}
    >
      {order.map((state, index) => {
        const ms = totals[totalOf[state]];
        if (ms === 0) return null;
        const width = (ms / whole) * 1000;
        const before = order.slice(0, index).reduce((sum, one) => sum + totals[totalOf[one]], 0);
        const x = (before / whole) * 1000;
        return (
          <rect
            key={state}
            x={x}
            y={22 - heights[state]}
            width={Math.max(width - 2, 1)}
            height={heights[state]}
            fill={state === 'silent' ? 'none' : `var(--${state})`}
            stroke={state === 'silent' ? 'var(--silent)' : 'none'}
            strokeDasharray="3 3"
            vectorEffect="non-scaling-stroke"
          >
            <title>{`${fixStateWords[state]}: ${duration(ms)}, ${percent(ms, whole)}`}</title>
          </rect>
        );
      })}
    </svg>
  );
}
