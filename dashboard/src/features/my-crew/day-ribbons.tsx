import type { CrewDayView } from '@hubtack/contracts/shifts/shift.js';
import { SpanRibbon } from '../../components/span-ribbon';
import { clockTime } from '../../lib/format';
import { ribbonWindow } from './ribbon-window';

const HOUR_MS = 3_600_000;
/** Drawn anew this often, not every second. */
const STEP_MS = 10_000;

/** The day so far as a ribbon, one a rover. */
export function DayRibbons({ day, now, zone }: { day: CrewDayView; now: number; zone: string }) {
  const { from, to } = ribbonWindow(day, Math.ceil(now / STEP_MS) * STEP_MS);
  const pauses = day.shifts.flatMap((shift) =>
    shift.pauses.map(({ start, end }) => ({ start, end: end ?? to })),
  );
  return (
    <div className="day-ribbons">
      <h2>Today</h2>
      {day.rovers.map(({ id, label, spans }) => (
        <figure key={id}>
          {day.rovers.length > 1 && <figcaption>{label}</figcaption>}
          <SpanRibbon
            spans={spans}
            pauses={pauses}
            from={from}
            to={to}
            zone={zone}
            tickMs={HOUR_MS}
            label={`Today, ${label}`}
          />
        </figure>
      ))}
      <p className="day-ends">
        <span>{clockTime(from, zone)}</span>
        <span>{clockTime(to, zone)}</span>
      </p>
    </div>
  );
}
