/** Arithmetic mean; null without values. Summed about the first value, so that large ones with small differences keep them. */
export function mean(values: readonly number[]): number | null {
  const first = values[0];
  if (first === undefined) return null;
  return first + values.reduce((sum, value) => sum + (value - first), 0) / values.length;
}

/**
 * Standard deviation of a sample (n - 1); null with fewer than two values. Two passes about the mean: sums of squares of large
 * numbers lose all of their small differences.
 */
export function standardDeviation(values: readonly number[]): number | null {
  const middle = mean(values);
  if (middle === null || values.length < 2) return null;
  const squares = values.reduce((sum, value) => sum + (value - middle) ** 2, 0);
  return Math.sqrt(squares / (values.length - 1));
}

/** Percentile by Hyndman and Fan's type 7 (American Statistician 50(4), 1996), p in [0, 1]; null without values. */
export function percentile(values: readonly number[], p: number): number | null {
  if (values.length === 0) return null;
  const list = values.toSorted((a, b) => a - b);
  const position = (list.length - 1) * p;
  const below = Math.floor(position);
  const above = Math.min(below + 1, list.length - 1);
  return list[below]! + (list[above]! - list[below]!) * (position - below);
}
