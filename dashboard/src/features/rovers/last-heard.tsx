import { dayAndTime, duration, utc } from '../../lib/format';
import { useMe } from '../../lib/session';
import { useNow } from '../../live/use-now';

const RECENT_MS = 24 * 3_600_000;

/** When a rover was last heard, as long ago as people would say it. */
export function LastHeard({ at }: { at: string | null }) {
  const { timeZone } = useMe();
  const now = useNow();
  if (at === null) return <>never</>;
  const time = Date.parse(at);
  const ago = now - time;
  return (
    <span title={utc(time)}>{ago < RECENT_MS ? `${duration(ago)} ago` : dayAndTime(time, timeZone)}</span>
  );
}
