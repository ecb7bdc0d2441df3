import { clopperPearson } from '../statistics/fraction-beyond';
import { histogram } from '../statistics/histogram';
import { countBeyondBounds, type Bounds } from './beyond-units';
import { settledOnLimits } from './on-limits';

export interface WhatIf {
  limits: Bounds;
  count: number;
  share: number;
  /** One-sided, 95 %. */
  upperBound: number;
  histogram: { edgesPpm: number[]; counts: number[] };
}

/**
 * What other limits would mean for a lot, without saving anything. Cheap enough to follow a dragged limit: one pass,
 * two binary searches, one beta quantile, one histogram.
 * @param sortedPpm ascending offsets in ppm, at least one
 * @throws StatisticsError when limits are crossed or both missing
 */
export function tryLimits(sortedPpm: Float64Array, limits: Bounds): WhatIf {
  const settledPpm = settledOnLimits(sortedPpm, limits);
  const drawn = histogram(settledPpm, { limits: [{ low: limits.lowPpm, high: limits.highPpm }] });
  const count = countBeyondBounds(settledPpm, limits);
  return {
    limits,
    count,
    share: count / sortedPpm.length,
    upperBound: clopperPearson(count, sortedPpm.length).upperBound,
    histogram: { edgesPpm: drawn.edges, counts: drawn.counts },
  };
}
