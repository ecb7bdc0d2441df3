import { type SampleSummary, requireSummary } from './capability';
import { requireOpenShare, requireWhole } from './checks';
import { betaCdf, betaQuantile } from './distributions/beta';
import { noncentralityFor } from './distributions/noncentral-t';
import { normalCdf, normalUpperTail } from './distributions/normal';
import { StatisticsError } from './errors';
import { type Limits, requireLimits } from './limits';
import { countBelow, countUpTo } from './sorted';

/** Units found beyond limits; a unit on a limit conforms. */
export interface ObservedBeyond {
  below: number;
  above: number;
  count: number;
  share: number;
}

/**
 * Units beyond the limits, counted.
 * @param sorted ascending, at least one value, in the unit of the limits
 * @throws StatisticsError when empty or limits are missing or crossed
 */
export function countBeyond(sorted: Float64Array, limits: Limits): ObservedBeyond {
  requireLimits(limits);
  const n = sorted.length;
  if (n === 0) throw new StatisticsError('too_few_values', 'sorted', 'must hold at least 1 value');
  const below = limits.low === null ? 0 : countBelow(sorted, limits.low);
  const above = limits.high === null ? 0 : n - countUpTo(sorted, limits.high);
  return { below, above, count: below + above, share: (below + above) / n };
}

/**
 * Exact binomial (Clopper-Pearson) bounds on the share behind `found` of n, whatever the distribution of the values.
 * Two-sided: beta quantiles at (1 -/+ confidence)/2; one-sided upper: beta quantile at the confidence itself.
 * @param found, n whole numbers, found <= n, n >= 1; confidence strictly between 0 and 1
 * @throws StatisticsError when an argument is out of range
 * Source: Clopper and Pearson, Biometrika 26, 1934.
 */
export function clopperPearson(
  found: number,
  n: number,
  confidence = 0.95,
): { low: number; high: number; upperBound: number } {
  requireWhole(found, 'found');
  requireWhole(n, 'n', 1);
  requireOpenShare(confidence, 'confidence');
  if (found > n) throw new StatisticsError('out_of_range', 'found', `cannot exceed n = ${n}`);
  const half = (1 - confidence) / 2;
  const upper = (p: number) => (found === n ? 1 : betaQuantile(p, found + 1, n - found));
  return {
    low: found === 0 ? 0 : betaQuantile(half, found, n - found + 1),
    high: upper(1 - half),
    upperBound: upper(confidence),
  };
}

/**
 * Plug-in normal estimate of the share beyond: Phi((low - mean)/s) + 1 - Phi((high - mean)/s). Biased: too large when small.
 * @throws StatisticsError when fewer than two values, no spread, or limits are missing or crossed
 */
export function plugInShare(summary: SampleSummary, limits: Limits): number {
  requireSummary(summary);
  requireLimits(limits);
  const { low, high } = limits;
  const { mean, sd } = summary;
  return (
    (low === null ? 0 : normalCdf((low - mean) / sd)) +
    (high === null ? 0 : normalUpperTail((high - mean) / sd))
  );
}

/**
 * Minimum variance unbiased estimate of the share of a normal population beyond the limits.
 * Each limit: I_x(n/2 - 1, n/2 - 1) with x = max(0, 1/2 - Q sqrt(n)/(2(n-1))), Q = distance of the limit from the mean in s;
 * two limits: the sum.
 * @param summary n >= 3 values
 * @throws StatisticsError when fewer than three values, no spread, or limits are missing or crossed
 * Source: Lieberman and Resnikoff, JASA 50, 1955; the form used by MIL-STD-414 and ISO 3951.
 */
export function unbiasedShare(summary: SampleSummary, limits: Limits): number {
  requireSummary(summary, 3);
  requireLimits(limits);
  const { n } = summary;
  const half = n / 2 - 1;
  const share = (q: number) => {
    const x = 0.5 - (q * Math.sqrt(n)) / (2 * (n - 1));
    return betaCdf(Math.min(1, Math.max(0, x)), half, half);
  };
  const { low, high } = distances(summary, limits);
  return Math.min(1, (low === null ? 0 : share(low)) + (high === null ? 0 : share(high)));
}

/**
 * Upper confidence bound on the share of a normal population beyond the limits.
 * One limit, exact: the delta with P(T'_(n-1, delta) <= Q sqrt n) = confidence gives the bound Phi(-delta/sqrt n).
 * Two limits, sound: each side gets its exact bound at half the error, (1 + confidence)/2, and the two are added; the chance
 * that the true share exceeds the sum is at most 1 - confidence whatever mean and spread are (Bonferroni). It errs on the
 * safe side: with one side negligible it is the exact bound at (1 + confidence)/2.
 * @param summary n >= 2 values
 * @throws StatisticsError when fewer than two values, no spread, limits missing or crossed, or confidence out of range
 * Source: Owen and Hua 1977; Hahn and Meeker, Statistical Intervals, 1991, 4.5.
 */
export function shareUpperBound(summary: SampleSummary, limits: Limits, confidence = 0.95): number {
  requireSummary(summary);
  requireLimits(limits);
  requireOpenShare(confidence, 'confidence');
  const { low, high } = distances(summary, limits);
  if (low === null) return oneSidedBound(high!, summary.n, confidence);
  if (high === null) return oneSidedBound(low, summary.n, confidence);
  const each = (1 + confidence) / 2;
  return Math.min(1, oneSidedBound(low, summary.n, each) + oneSidedBound(high, summary.n, each));
}

function oneSidedBound(q: number, n: number, confidence: number): number {
  const rootN = Math.sqrt(n);
  return normalUpperTail(noncentralityFor(q * rootN, n - 1, confidence) / rootN);
}

/** Distance of the mean inside each limit, in standard deviations. */
function distances({ mean, sd }: SampleSummary, { low, high }: Limits) {
  return {
    low: low === null ? null : (mean - low) / sd,
    high: high === null ? null : (high - mean) / sd,
  };
}
