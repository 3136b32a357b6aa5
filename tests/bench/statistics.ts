export const sorted = (values: readonly number[]): number[] => values.toSorted((a, b) => a - b);

/** Hyndman-Fan type 7 percentile, p in [0, 1]. */
export function percentile(values: readonly number[], p: number): number {
  const list = sorted(values);
  if (list.length === 0) return NaN;
  const position = (list.length - 1) * p;
  const below = Math.floor(position);
  const above = Math.min(below + 1, list.length - 1);
  return list[below]! + (list[above]! - list[below]!) * (position - below);
}

export const median = (values: readonly number[]): number => percentile(values, 0.5);
