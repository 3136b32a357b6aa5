import { addTotals, noTotals, wholeOf } from '@hubtack/contracts/fixes/totals.js';
import type { Lane } from '@hubtack/contracts/board/lane.js';
import { fixStates, fixStateWords, type FixState } from '@hubtack/contracts/fixes/fix-state.js';
import { StateGlyph } from '../../components/state-glyph';
import { stateNow, totalsNow } from '../../live/lane-figures';
import { percent } from '../../lib/percent';
import { isOnShift } from './filter';

interface StateCountsProps {
  lanes: readonly Lane[];
  now: number;
  chosen: FixState | null;
  onChoose: ((state: FixState | null) => void) | null;
}

const words = (state: FixState) => fixStateWords[state].toLowerCase();

/** How many crews on shift are in each state; a click shows only those. */
export function StateCounts({ lanes, now, chosen, onChoose }: StateCountsProps) {
  const onShift = lanes.filter((lane) => isOnShift(lane, now));
  const count = (state: FixState) => onShift.filter((lane) => stateNow(lane, now).state === state).length;
  const totals = lanes.reduce((sum, lane) => addTotals(sum, totalsNow(lane, now)), noTotals());
  return (
    <div className="counts">
      <ul>
        {fixStates.map((state) => {
          const number = count(state);
          const content = (
            <>
              <StateGlyph state={state} />
              <span className="counts-number">{number}</span>
              <span>{words(state)}</span>
            </>
          );
          return (
            <li key={state} data-none={number === 0}>
              {onChoose ? (
                <button
                  type="button"
                  aria-pressed={chosen === state}
                  onClick={() => onChoose(chosen === state ? null : state)}
                >
                  {content}
                </button>
              ) : (
                <span className="counts-still">{content}</span>
              )}
            </li>
          );
        })}
      </ul>
      <p>
        {onShift.length} of {lanes.length} rovers on shift · {percent(totals.fixedMs, wholeOf(totals))}
        {wholeOf(totals) > 0 ? ' fix uptime so far today' : ' on fix uptime yet'}
      </p>
    </div>
  );
}
