import { type Capability, capability } from './capability';
import type { LotDescription } from './describe';
import {
  clopperPearson,
  countBeyond,
  type ObservedBeyond,
  plugInShare,
  shareUpperBound,
  unbiasedShare,
} from './fraction-beyond';
import type { Limits } from './limits';
import { type Trust, trustworthyMethod } from './trust';

/** The share of a lot beyond limits, by count and by normal theory, and which to trust. */
export interface LimitAssessment {
  limits: Limits;
  confidence: number;
  /** Counted, with exact binomial bounds: two-sided interval and one-sided upper bound. */
  observed: ObservedBeyond & { lowShare: number; highShare: number; upperBound: number };
  /** Normal-theory figures; null without spread, the unbiased estimate also below three units. */
  normal: { plugIn: number; unbiased: number | null; upperBound: number } | null;
  capability: Capability | null;
  trust: Trust;
}

/**
 * Judges a described lot against limits: cheap enough to repeat while someone drags a limit.
 * @param lot as `describeOffsets` gives it @param limits in ppm
 * @param confidence of every bound, one-sided unless said otherwise
 * @throws StatisticsError when limits are missing or crossed or confidence is out of range
 */
export function assessLimits(
  lot: LotDescription,
  limits: Limits,
  confidence = 0.95,
): LimitAssessment {
  const counted = countBeyond(lot.sortedPpm, limits);
  const bounds = clopperPearson(counted.count, lot.units, confidence);
  const summary = { n: lot.units, mean: lot.meanPpm, sd: lot.sdPpm ?? 0 };
  const spread = summary.sd > 0;
  return {
    limits,
    confidence,
    observed: {
      ...counted,
      lowShare: bounds.low,
      highShare: bounds.high,
      upperBound: bounds.upperBound,
    },
    normal: spread
      ? {
          plugIn: plugInShare(summary, limits),
          unbiased: lot.units >= 3 ? unbiasedShare(summary, limits) : null,
          upperBound: shareUpperBound(summary, limits, confidence),
        }
      : null,
    capability: spread ? capability(summary, limits, confidence) : null,
    trust: trustworthyMethod({
      n: lot.units,
      found: counted.count,
      normality: lot.normality,
      outliers: lot.outliers,
      clusters: lot.clusters,
    }),
  };
}
