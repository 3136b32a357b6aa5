import { useServerNow } from '../live/use-lanes';
import { clockTimeSeconds, utc, zoneName } from '../lib/format';
import { useMe } from '../lib/session';

/** The time that counts, in the firm's zone. */
export function FirmClock() {
  const { timeZone } = useMe();
  const now = useServerNow();
  return (
    <time className="firm-clock" dateTime={new Date(now).toISOString()} title={utc(now)}>
      {clockTimeSeconds(now, timeZone)} {zoneName(now, timeZone)}
    </time>
  );
}
