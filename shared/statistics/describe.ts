import { requireCount } from './checks';
import { type ClusterWarning, twoClusters } from './clusters';
import { type Histogram, type HistogramOptions, histogram } from './histogram';
import { moments } from './moments';
import { type NormalityTest, andersonDarling } from './normality';
import { type EsdTest, generalisedEsd } from './outliers';
import { median, quantile } from './quantiles';
import { sortedAscending } from './sorted';

/** Everything about a lot's offsets that does not depend on a limit; computed once per set of readings. */
export interface LotDescription {
  units: number;
  /** The offsets in ascending order, in ppm. */
  sortedPpm: Float64Array;
  meanPpm: number;
  /** Sample standard deviation in ppm; null for a single unit. */
  sdPpm: number | null;
  medianPpm: number;
  minPpm: number;
  maxPpm: number;
  skewness: number | null;
  excessKurtosis: number | null;
  /** Type 7 quantiles at DESCRIBED_SHARES. */
  quantilesPpm: { share: number; offsetPpm: number }[];
  /** Null below eight units or without spread. */
  normality: NormalityTest | null;
  /** Null below ten units or without spread. */
  outliers: EsdTest | null;
  /** Null below ten units. */
  clusters: ClusterWarning | null;
}

export const DESCRIBED_SHARES = [0.001, 0.01, 0.05, 0.25, 0.5, 0.75, 0.95, 0.99, 0.999];

/**
 * Describes the offsets of a lot: moments, quantiles, normality, outliers, clusters. One sort, a few plain passes.
 * What cannot be said of the units at hand (too few, no spread) is null rather than an error.
 * @param offsetsPpm one offset a unit, in ppm, at least one, finite, any order; left unchanged
 * @throws StatisticsError when empty or not all finite
 */
export function describeOffsets(offsetsPpm: Float64Array): LotDescription {
  requireCount(offsetsPpm.length, 'offsetsPpm', 1);
  const sortedPpm = sortedAscending(offsetsPpm);
  const units = sortedPpm.length;
  // Moments from the measured order: the sorted one would pile rounding up on one side.
  const shape = units > 1 ? moments(offsetsPpm) : null;
  const spread = shape !== null && shape.sd > 0;
  return {
    units,
    sortedPpm,
    meanPpm: shape?.mean ?? sortedPpm[0]!,
    sdPpm: shape?.sd ?? null,
    medianPpm: median(sortedPpm),
    minPpm: sortedPpm[0]!,
    maxPpm: sortedPpm[units - 1]!,
    skewness: shape?.skewness ?? null,
    excessKurtosis: shape?.excessKurtosis ?? null,
    quantilesPpm: DESCRIBED_SHARES.map((share) => ({
      share,
      offsetPpm: quantile(sortedPpm, share),
    })),
    normality: spread && units >= 8 ? andersonDarling(sortedPpm, shape.mean, shape.sd) : null,
    outliers:
      spread && units >= 10
        ? generalisedEsd(sortedPpm, Math.min(10, Math.floor(units / 10)))
        : null,
    clusters: units >= 10 ? twoClusters(sortedPpm) : null,
  };
}

/** Histogram of a described lot in ppm; see `histogram` for the treatment of limits. */
export function offsetHistogram(
  lot: Pick<LotDescription, 'sortedPpm'>,
  options?: HistogramOptions,
): Histogram {
  return histogram(lot.sortedPpm, options);
}
