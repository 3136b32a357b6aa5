import { fixStateWords, type FixState } from '@hubtack/contracts/fixes/fix-state.js';
import { memo, useId, useState, type KeyboardEvent, type PointerEvent } from 'react';
import { clockTimeSeconds, duration } from '../lib/format';
import './span-ribbon.css';

export interface RibbonPart {
  state: FixState;
  start: number;
  end: number;
}

interface SpanRibbonProps {
  spans: readonly RibbonPart[];
  pauses: readonly { start: number; end: number }[];
  from: number;
  to: number;
  zone: string;
  /** Whose ribbon it is, for people who hear it. */
  label: string;
  tickMs?: number;
}

const WIDTH = 1000;
const HEIGHT = 30;
/** Height is the state: full, two thirds, a third, a line, a gap. */
const heights: Record<FixState, number> = { fixed: 30, float: 20, code: 10, none: 2.5, silent: 0 };
const drawn = ['fixed', 'float', 'code', 'none'] as const;

/** Rectangles of one state as one path: a ribbon is four paths, however many spans it has. */
function pathOf(spans: readonly RibbonPart[], state: FixState, from: number, to: number): string {
  const scale = WIDTH / (to - from);
  const height = heights[state];
  let path = '';
  for (const span of spans) {
    if (span.state !== state || span.end <= from || span.start >= to) continue;
    const x = (Math.max(span.start, from) - from) * scale;
    // A loss of a second is still to be seen: never thinner than a pixel or so.
    const width = Math.max((Math.min(span.end, to) - from) * scale - x, 1);
    path += `M${x.toFixed(1)} ${HEIGHT - height}h${width.toFixed(1)}v${height}h${(-width).toFixed(1)}z`;
  }
  return path;
}

const partAt = (spans: readonly RibbonPart[], at: number, from: number, to: number): RibbonPart => {
  const inside = spans.find((span) => span.start <= at && at < span.end);
  if (inside) return inside;
  const before = spans.findLast((span) => span.end <= at);
  const after = spans.find((span) => span.start > at);
  return { state: 'silent', start: before?.end ?? from, end: after?.start ?? to };
};

/** The last hour (or a day) of one rover as a band whose height is the state. Hover, or arrow keys, tell what and how long. */
export const SpanRibbon = memo(function SpanRibbon({
  spans,
  pauses,
  from,
  to,
  zone,
  label,
  tickMs = 900_000,
}: SpanRibbonProps) {
  const hatch = useId();
  const [at, setAt] = useState<number | null>(null);
  const scale = WIDTH / (to - from);
  const part = at === null ? null : partAt(spans, at, from, to);
  const point = (event: PointerEvent<HTMLDivElement>) => {
    const box = event.currentTarget.getBoundingClientRect();
    setAt(from + ((event.clientX - box.left) / box.width) * (to - from));
  };
  const stepTo = (event: KeyboardEvent) => {
    if (event.key !== 'ArrowLeft' && event.key !== 'ArrowRight') return;
    event.preventDefault();
    event.stopPropagation();
    const current = part ?? partAt(spans, to - 1, from, to);
    const next = event.key === 'ArrowLeft' ? current.start - 1 : current.end;
    setAt(Math.min(Math.max(next, from), to - 1));
  };
  const words = (one: RibbonPart) =>
    `${fixStateWords[one.state]} from ${clockTimeSeconds(one.start, zone)}, ${duration(one.end - one.start)}`;
  const ticks = Array.from(
    { length: Math.floor((to - from) / tickMs) + 1 },
    (_, index) => index * tickMs * scale,
  );
  return (
    <div
      className="ribbon"
      role="slider"
      tabIndex={0}
      aria-label={label}
      aria-valuemin={0}
      aria-valuemax={100}
      aria-valuenow={at === null ? 100 : Math.round(((at - from) / (to - from)) * 100)}
      aria-valuetext={words(part ?? partAt(spans, to - 1, from, to))}
      onPointerMove={point}
      onPointerLeave={() => setAt(null)}
      onBlur={() => setAt(null)}
      onKeyDown={stepTo}
    >
      <svg viewBox={`0 0 ${WIDTH} ${HEIGHT + 4}`} preserveAspectRatio="none" aria-hidden>
        <defs>
          <pattern
            id={hatch}
            width="9"
            height="9"
            patternUnits="userSpaceOnUse"
            patternTransform="rotate(45)"
          >
            <line x1="0" y1="0" x2="0" y2="9" stroke="var(--hatch)" strokeWidth="3" />
          </pattern>
        </defs>
        {drawn.map((state) => (
          <path key={state} d={pathOf(spans, state, from, to)} fill={`var(--${state})`} />
        ))}
        {pauses.map((pause) => {
          const x = (Math.max(pause.start, from) - from) * scale;
          const width = (Math.min(pause.end, to) - from) * scale - x;
          if (width <= 0) return null;
          return (
            <g key={pause.start}>
              <rect x={x} y={0} width={width} height={HEIGHT} fill="var(--paper)" />
              <rect x={x} y={0} width={width} height={HEIGHT} fill={`url(#${hatch})`} />
            </g>
          );
        })}
        <path
          d={`M0 ${HEIGHT}h${WIDTH}`}
          stroke="var(--silent)"
          strokeWidth="1"
          vectorEffect="non-scaling-stroke"
        />
        {ticks.map((x) => (
          <path
            key={x}
            d={`M${x.toFixed(1)} ${HEIGHT}v4`}
            stroke="var(--silent)"
            strokeWidth="1"
            vectorEffect="non-scaling-stroke"
          />
        ))}
      </svg>
      {part && <div className="ribbon-words">{words(part)}</div>}
    </div>
  );
});
