import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { useQuery } from '@tanstack/react-query';
import EpochCharts from '../../components/epoch-charts';
import { SpanRibbon } from '../../components/span-ribbon';
import { useServerNow } from '../../live/use-lanes';
import { settingsQuery } from '../../lib/settings';
import { useMe } from '../../lib/session';
import { timelineQuery } from '../../lib/timeline';

const BEFORE_MS = 120_000;
/** After the end, enough to see that the fix held. */
const AFTER_MS = 30_000;
const STEP_MS = 5000;

/** The two minutes before and everything since: state as a ribbon, age, satellites and HDOP as lines. */
export function LossCharts({ lostFix, roverId }: { lostFix: LostFix; roverId: number }) {
  const now = useServerNow();
  const { timeZone } = useMe();
  const limits = useQuery(settingsQuery).data?.limits;
  const from = lostFix.startAt - BEFORE_MS;
  const to = lostFix.endAt === null ? null : lostFix.endAt + AFTER_MS;
  const until = to ?? Math.ceil(now / STEP_MS) * STEP_MS;
  const { data } = useQuery(timelineQuery(roverId, from, to));
  return (
    <section aria-label="Before and since">
      <h2>Two minutes before, and since</h2>
      <SpanRibbon
        spans={data ?? []}
        pauses={[]}
        from={from}
        to={until}
        zone={timeZone}
        label={`State of ${lostFix.roverLabel} before and since`}
        tickMs={60_000}
      />
      <EpochCharts
        roverId={roverId}
        from={from}
        to={to}
        zone={timeZone}
        mark={lostFix.startAt}
        maxAgeSeconds={limits?.maxAgeSeconds ?? 10}
        withHdop
      />
    </section>
  );
}
