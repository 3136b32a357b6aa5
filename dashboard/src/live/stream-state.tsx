import { clockTime, duration } from '../lib/format';
import { useMe } from '../lib/session';
import { useFreshness } from './live-context';

/** How old the page is: a filled mark while live, an open one when delayed, a broken one when cut off; and words. */
export function StreamState() {
  const { timeZone } = useMe();
  const freshness = useFreshness();
  const words = () => {
    switch (freshness.kind) {
      case 'connecting':
        return 'connecting';
      case 'live':
        return 'live';
      case 'delayed':
        return `delayed ${duration(freshness.ms)}`;
      case 'cut':
        return `cut off since ${clockTime(freshness.since, timeZone)}`;
    }
  };
  const isGood = freshness.kind === 'live';
  return (
    <span className="stream-state" role="status" data-state={freshness.kind}>
      <svg width="12" height="12" viewBox="0 0 12 12" aria-hidden>
        <path
          d="M6 0.8 11.2 6 6 11.2 0.8 6z"
          fill={isGood ? 'var(--fixed)' : 'none'}
          stroke={isGood ? 'var(--fixed)' : 'var(--float)'}
          strokeWidth="1.6"
          strokeDasharray={freshness.kind === 'cut' ? '2 1.6' : undefined}
        />
      </svg>
      {words()}
    </span>
  );
}
