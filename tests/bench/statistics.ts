import { percentile as known } from '@hubtack/backend/common/statistics.js';

/** Percentile of what was measured, p in [0, 1]; NaN without any. */
export const percentile = (values: readonly number[], p: number): number => known(values, p) ?? NaN;

export const median = (values: readonly number[]): number => percentile(values, 0.5);
