import { requireCount, requireFinite, requireSpread } from '../statistics/checks';
import { betaCdf } from '../statistics/distributions/beta';
import { StatisticsError } from '../statistics/errors';

export interface VariablesVerdict {
  /** Distance of each limit from the mean in standard deviations; null where there is no limit. */
  qualityIndexLow: number | null;
  qualityIndexHigh: number | null;
  /** The smaller of the two. */
  qualityIndex: number;
  /** Unbiased estimate of the share beyond the limits of a normal lot. */
  estimatedShare: number;
  /** The same estimate for a lot that lies exactly k from one limit: the most the plan allows. */
  largestShare: number;
  met: boolean;
}

/**
 * Does a sample meet a variables plan of unknown standard deviation?
 * One limit: accept when Q = distance/s >= k. Two limits: accept when pL + pU <= M, with p the unbiased estimate
 * I(x; n/2 - 1, n/2 - 1), x = max(0, 1/2 - Q sqrt(n)/(2 (n - 1))), and M that estimate at Q = k.
 * @param sample n of 3 or more, mean and standard deviation (n - 1) in ppm
 * @throws StatisticsError when there are too few values, no spread, no limit, or the limits are crossed
 * Source: MIL-STD-414 (1957), forms 1 and 2 (from memory); Lieberman and Resnikoff, JASA 50, 1955.
 */
export function variablesVerdict(
  sample: { units: number; meanPpm: number; sdPpm: number },
  limits: { lowPpm: number | null; highPpm: number | null },
  k: number,
): VariablesVerdict {
  const { units, meanPpm, sdPpm } = sample;
  const { lowPpm, highPpm } = limits;
  requireCount(units, 'sample', 3);
  requireFinite(meanPpm, 'meanPpm');
  requireSpread(sdPpm, 'sdPpm');
  requireFinite(k, 'k');
  if (lowPpm === null && highPpm === null)
    throw new StatisticsError('limits_missing', 'limits', 'must hold at least one limit');
  if (lowPpm !== null && highPpm !== null && lowPpm >= highPpm)
    throw new StatisticsError(
      'limits_crossed',
      'limits',
      'must have the upper limit above the lower one',
    );
  const qualityIndexLow = lowPpm === null ? null : (meanPpm - lowPpm) / sdPpm;
  const qualityIndexHigh = highPpm === null ? null : (highPpm - meanPpm) / sdPpm;
  const qualityIndex = Math.min(qualityIndexLow ?? Infinity, qualityIndexHigh ?? Infinity);
  const estimatedShare = Math.min(
    1,
    shareAt(qualityIndexLow, units) + shareAt(qualityIndexHigh, units),
  );
  const largestShare = shareAt(k, units);
  const twoLimits = qualityIndexLow !== null && qualityIndexHigh !== null;
  const met = qualityIndex >= k && (!twoLimits || estimatedShare <= largestShare);
  return { qualityIndexLow, qualityIndexHigh, qualityIndex, estimatedShare, largestShare, met };
}

function shareAt(qualityIndex: number | null, units: number): number {
  if (qualityIndex === null) return 0;
  const x = 0.5 - (qualityIndex * Math.sqrt(units)) / (2 * (units - 1));
  const half = units / 2 - 1;
  return betaCdf(Math.min(1, Math.max(0, x)), half, half);
}
