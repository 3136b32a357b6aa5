/** Half-open stretch of time [start, end), ms UTC. Lists of them are sorted and disjoint. */
export interface Interval {
  start: number;
  end: number;
}

/** Time that is in both lists. Linear in their lengths. */
export function intersect(left: readonly Interval[], right: readonly Interval[]): Interval[] {
  const both: Interval[] = [];
  let i = 0;
  let j = 0;
  while (i < left.length && j < right.length) {
    const start = Math.max(left[i]!.start, right[j]!.start);
    const end = Math.min(left[i]!.end, right[j]!.end);
    if (start < end) both.push({ start, end });
    if (left[i]!.end < right[j]!.end) i++;
    else j++;
  }
  return both;
}

/** Time that is in `from` and not in `taken`. */
export function subtract(from: readonly Interval[], taken: readonly Interval[]): Interval[] {
  const left: Interval[] = [];
  for (const { start, end } of from) {
    let at = start;
    for (const hole of taken) {
      if (hole.end <= at || hole.start >= end) continue;
      if (hole.start > at) left.push({ start: at, end: hole.start });
      at = Math.max(at, hole.end);
    }
    if (at < end) left.push({ start: at, end });
  }
  return left;
}

export const clip = (list: readonly Interval[], window: Interval): Interval[] => intersect(list, [window]);

/** Any intervals as a sorted and disjoint list. */
export function union(list: readonly Interval[]): Interval[] {
  const joined: Interval[] = [];
  for (const interval of list.toSorted((a, b) => a.start - b.start)) {
    if (interval.end <= interval.start) continue;
    const last = joined.at(-1);
    if (last && interval.start <= last.end) last.end = Math.max(last.end, interval.end);
    else joined.push({ ...interval });
  }
  return joined;
}

export const totalMs = (list: readonly Interval[]): number =>
  list.reduce((sum, { start, end }) => sum + end - start, 0);
