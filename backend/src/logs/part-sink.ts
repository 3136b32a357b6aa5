import { fixStates, type FixState } from '@hubtack/contracts/fixes/fix-state.js';
import type { LogSummary } from '@hubtack/contracts/logs/log.js';
import type { StateTotals } from '@hubtack/contracts/fixes/timeline.js';
import { noTotals, totalOf } from '@hubtack/contracts/fixes/totals.js';
import type { HeardSpan, TimelineSpan } from '../fixes/timeline.js';

const MOST_TRANSITIONS = 2000;
/** More than a ribbon has room for. */
const MOST_SPANS = 2000;
const BUCKETS = MOST_SPANS;

/**
 * Takes the heard spans of a log in order and makes of them, as `partition` does, what fills [first, last) without a gap: totals and changes, all of
 * them counted, and spans to draw, at most MOST_SPANS: where there are more, so many equal pieces, each in the state that most is left to be shown of.
 */
export class PartSink {
  readonly totals: StateTotals = noTotals();
  readonly transitions: LogSummary['transitions'] = [];
  moreTransitions = 0;
  private spans: TimelineSpan[] | null = [];
  private readonly buckets = new Float64Array(BUCKETS * fixStates.length);
  private readonly bucketMs: number;
  private at: number;
  private state: FixState | null = null;

  constructor(
    private readonly first: number,
    private readonly last: number,
  ) {
    this.at = first;
    this.bucketMs = (last - first) / BUCKETS;
  }

  push(span: HeardSpan): void {
    if (span.start > this.at) this.add('silent', this.at, span.start);
    this.add(span.state, span.start, Math.min(span.end, this.last));
    this.at = span.end;
  }

  drawn(): TimelineSpan[] {
    if (this.spans) return this.spans;
    const drawn: TimelineSpan[] = [];
    // What a piece cannot show is owed by the next ones: states keep their shares, short ones too.
    const owed = new Float64Array(fixStates.length);
    for (let bucket = 0; bucket < BUCKETS; bucket++) {
      for (let place = 0; place < fixStates.length; place++)
        owed[place]! += this.buckets[bucket * fixStates.length + place]!;
      const place = owed.indexOf(Math.max(...owed));
      owed[place]! -= this.bucketMs;
      const state = fixStates[place]!;
      const end = this.first + Math.round((bucket + 1) * this.bucketMs);
      const before = drawn.at(-1);
      if (before?.state === state) before.end = end;
      else drawn.push({ state, start: before?.end ?? this.first, end });
    }
    return drawn;
  }

  private add(state: FixState, start: number, end: number): void {
    if (end <= start) return;
    this.totals[totalOf[state]] += end - start;
    if (this.state !== null) {
      if (this.transitions.length < MOST_TRANSITIONS)
        this.transitions.push({ time: new Date(start).toISOString(), from: this.state, to: state });
      else this.moreTransitions++;
    }
    this.state = state;
    this.draw(state, start, end);
  }

  private draw(state: FixState, start: number, end: number): void {
    if (this.spans && this.spans.length >= MOST_SPANS) this.spans = null;
    this.spans?.push({ state, start, end });
    const place = fixStates.indexOf(state);
    const bucketOf = (time: number) => Math.min(BUCKETS - 1, Math.floor((time - this.first) / this.bucketMs));
    for (let bucket = bucketOf(start); bucket <= bucketOf(end); bucket++) {
      const from = Math.max(start, this.first + bucket * this.bucketMs);
      const to = Math.min(end, this.first + (bucket + 1) * this.bucketMs);
      if (to > from) this.buckets[bucket * fixStates.length + place]! += to - from;
    }
  }
}
