import { causeLabels } from '@hubtack/contracts/lost-fixes/cause.js';
import type { Weekly } from '@hubtack/contracts/weekly/weekly.js';
import { useId } from 'react';
import { Link } from 'react-router-dom';
import { hours } from '../../lib/format';

interface LostBar {
  key: string;
  name: string;
  lostMs: number;
  lostFixes: number | null;
  isLikelyOnly: boolean;
  to: string | null;
}

/** Lost time by cause, by mount point and by rover: the longest first. What nobody has confirmed is hatched. */
export function LostBars({ data }: { data: Weekly }) {
  const causes = data.causes.map(({ cause, isConfirmed, lostMs, lostFixes }): LostBar => ({
    key: `${cause} ${isConfirmed}`,
    name: isConfirmed ? causeLabels[cause] : `${causeLabels[cause]} (likely, not confirmed)`,
    lostMs,
    lostFixes,
    isLikelyOnly: !isConfirmed,
    to: null,
  }));
  const mountPoints = data.mountPoints.map(({ mountPoint, lostMs, lostFixes }): LostBar => ({
    key: mountPoint ?? '',
    name: mountPoint ?? 'No mount point',
    lostMs,
    lostFixes,
    isLikelyOnly: false,
    to: mountPoint === null ? null : `/lost-fixes?mountPoint=${encodeURIComponent(mountPoint)}`,
  }));
  const rovers = data.rovers.map(({ roverId, roverLabel, lostMs, figures }): LostBar => ({
    key: String(roverId),
    name: roverLabel,
    lostMs,
    lostFixes: figures.lostFixes,
    isLikelyOnly: false,
    to: `/lost-fixes?roverId=${roverId}`,
  }));
  return (
    <div className="weekly-columns weekly-lost">
      <Bars title="Lost time by cause" bars={causes} />
      <Bars title="Lost time by mount point" bars={mountPoints} />
      <Bars title="Lost time by rover" bars={rovers} />
    </div>
  );
}

function Bars({ title, bars }: { title: string; bars: readonly LostBar[] }) {
  const hatch = useId();
  const longest = Math.max(1, ...bars.map(({ lostMs }) => lostMs));
  return (
    <section aria-label={title}>
      <h2>{title}</h2>
      {bars.length === 0 ? (
        <p>No fix was lost.</p>
      ) : (
        <ul className="lost-bars">
          {bars.map(({ key, name, lostMs, lostFixes, isLikelyOnly, to }) => (
            <li key={key}>
              <span>{to === null ? name : <Link to={to}>{name}</Link>}</span>
              <span>
                {hours(lostMs)}
                {lostFixes !== null && <small> in {lostFixes}</small>}
              </span>
              <svg viewBox="0 0 100 6" preserveAspectRatio="none" aria-hidden>
                <defs>
                  <pattern id={hatch} width="1.4" height="6" patternUnits="userSpaceOnUse">
                    <rect width="0.7" height="6" fill="var(--ink-soft)" />
                  </pattern>
                </defs>
                <rect
                  width={(lostMs / longest) * 100}
                  height="6"
                  fill={isLikelyOnly ? `url(#${hatch})` : 'var(--ink)'}
                />
              </svg>
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}
