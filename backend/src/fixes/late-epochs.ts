/** A stretch of late epochs of one rover, first and last time. */
export interface LateStretch {
  first: number;
  last: number;
}

/** Groups times so that each group can be worked out again by itself: gaps over `gapMs` separate. */
export function stretchesOf(times: readonly number[], gapMs: number): LateStretch[] {
  const stretches: LateStretch[] = [];
  for (const time of times.toSorted((a, b) => a - b)) {
    const current = stretches.at(-1);
    if (current && time - current.last <= gapMs) current.last = time;
    else stretches.push({ first: time, last: time });
  }
  return stretches;
}
