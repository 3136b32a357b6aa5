import { fixStateOfQuality } from '@hubtack/contracts/fixes/fix-state.js';
import type { LogDetail, LogSummary } from '@hubtack/contracts/logs/log.js';
import { noTotals } from '@hubtack/contracts/fixes/totals.js';
import { spanOfTail, step, type HeardSpan, type Step, type Tail } from '../fixes/timeline.js';
import type { EpochColumns } from './epoch-columns.js';
import { PartSink } from './part-sink.js';

/** Points that a chart can show; the last thinning leaves at least half of them. */
const MOST_POINTS = 1200;
/** Spans are kept for the losses up to here: days of a receiver at work have a few thousand. */
const MOST_HEARD_SPANS = 50_000;
const MOST_SATELLITES = 256;

export interface LogFigures {
  summary: Pick<
    LogSummary,
    | 'firstTime'
    | 'lastTime'
    | 'totals'
    | 'transitions'
    | 'moreTransitions'
    | 'medianSatellites'
    | 'maxAgeSeconds'
  >;
  detail: Pick<LogDetail, 'spans' | 'points'>;
  /** Heard spans; null when there are too many to look for losses. */
  spans: HeardSpan[] | null;
  /** When corrections first came (a quality of 4 or 5, or a base station id), ms UTC; null when they never did. */
  correctedAt: number | null;
}

const iso = (time: number): string => new Date(time).toISOString();

/** Figures of a log over [first epoch, last epoch), by the timeline's own steps. Columns must have been settled. */
export function figuresOf(columns: EpochColumns): LogFigures {
  const { count } = columns;
  if (count === 0) return nothing();
  const [first, last] = [columns.time(0), columns.time(count - 1)];
  const parts = new PartSink(first, last);
  let spans: HeardSpan[] | null = [];
  const close = (span: HeardSpan): void => {
    parts.push(span);
    if (spans && spans.length >= MOST_HEARD_SPANS) spans = null;
    spans?.push(span);
  };
  const satellites = new Uint32Array(MOST_SATELLITES);
  const points = new Thinning((last - first) / MOST_POINTS);
  let maxAgeMs: number | null = null;
  let correctedAt: number | null = null;
  let tail: Tail | null = null;
  for (let index = 0; index < count; index++) {
    const [time, quality] = [columns.time(index), columns.quality(index)];
    const next: Step = step(tail, { time, quality });
    if (next.closed) close(next.closed);
    tail = next.tail;
    const used = columns.satellites(index);
    if (used !== null) satellites[used]!++;
    const ageMs = columns.ageMs(index);
    if (ageMs !== null) maxAgeMs = Math.max(maxAgeMs ?? 0, ageMs);
    if (correctedAt === null && (quality === 4 || quality === 5 || columns.hasStation(index)))
      correctedAt = time;
    if (points.wants(time))
      points.add({
        at: time,
        state: fixStateOfQuality(quality),
        satellites: used,
        ageMs,
        hdop: columns.hdop(index),
      });
  }
  close(spanOfTail(tail!));
  const { totals, transitions, moreTransitions } = parts;
  return {
    summary: {
      firstTime: iso(first),
      lastTime: iso(last),
      totals,
      transitions,
      moreTransitions,
      medianSatellites: medianOfCounts(satellites),
      maxAgeSeconds: maxAgeMs === null ? null : maxAgeMs / 1000,
    },
    detail: { spans: parts.drawn(), points: points.kept },
    spans,
    correctedAt,
  };
}

function nothing(): LogFigures {
  return {
    summary: {
      firstTime: null,
      lastTime: null,
      totals: noTotals(),
      transitions: [],
      moreTransitions: 0,
      medianSatellites: null,
      maxAgeSeconds: null,
    },
    detail: { spans: [], points: [] },
    spans: [],
    correctedAt: null,
  };
}

/** Keeps at most MOST_POINTS points, evenly in time; where the log has long gaps, the width adapts to what is there. */
class Thinning {
  kept: LogDetail['points'] = [];
  private nextAt = -Infinity;

  constructor(private widthMs: number) {
    // A gap of years must not push all points into two: begin fine, and widen as needed.
    this.widthMs = Math.min(widthMs, 1000);
  }

  wants(time: number): boolean {
    return time >= this.nextAt;
  }

  add(point: LogDetail['points'][number]): void {
    this.kept.push(point);
    while (this.kept.length > MOST_POINTS) this.widen();
    this.nextAt = this.kept.at(-1)!.at + this.widthMs;
  }

  private widen(): void {
    this.widthMs = Math.max(1, this.widthMs * 2);
    let nextAt = -Infinity;
    this.kept = this.kept.filter(({ at }) => {
      if (at < nextAt) return false;
      nextAt = at + this.widthMs;
      return true;
    });
  }
}

/** Median by Hyndman and Fan's type 7 of whole numbers that are counted; null without any. */
function medianOfCounts(counts: Uint32Array): number | null {
  const total = counts.reduce((sum, count) => sum + count, 0);
  if (total === 0) return null;
  const valueAt = (position: number): number => {
    let seen = 0;
    return counts.findIndex((count) => (seen += count) > position);
  };
  return (valueAt(Math.floor((total - 1) / 2)) + valueAt(Math.ceil((total - 1) / 2))) / 2;
}
