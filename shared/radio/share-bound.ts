import { RadioError, requireNonNegative, requireWithin } from './errors';

export type ShareBoundMethod = 'chernoff-hoeffding' | 'empirical-bernstein' | 'whole-lot';

export interface ShareBound {
  upper: number;
  method: ShareBoundMethod;
}

/** Relative entropy of a coin of share p against one of share q. */
function divergence(p: number, q: number): number {
  const ofOnes = p > 0 ? p * Math.log(p / q) : 0;
  const ofZeros = p < 1 ? (1 - p) * (Math.log1p(-p) - Math.log1p(-q)) : 0;
  return ofOnes + ofZeros;
}

/**
 * Largest mean that a sample of values in [0, 1] does not contradict (Chernoff-Hoeffding).
 *
 * The upper bound is the q above the sample mean m with n D(m, q) = ln(1/risk). With m = 0 it is
 * 1 - risk^(1/n), the Clopper-Pearson bound of no event.
 *
 * @param mean sample mean, 0 to 1
 * @param count n, independent values
 * @param risk one-sided risk, strictly between 0 and 1
 * @see W. Hoeffding, J. Amer. Statist. Assoc. 58 (1963), theorem 1; section 5 for averages over pairs
 */
export function chernoffUpper(mean: number, count: number, risk: number): number {
  requireWithin(mean, 0, 1, 'mean');
  if (!(count >= 1)) throw new RadioError('too_few', 'count', 'must be at least 1');
  requireWithin(risk, Number.MIN_VALUE, 1 - Number.EPSILON, 'risk');
  const reach = -Math.log(risk) / count;
  let low = mean;
  let high = 1;
  for (let step = 0; step < 100 && high - low > Number.EPSILON * high; step += 1) {
    const middle = (low + high) / 2;
    if (divergence(mean, middle) < reach) low = middle;
    else high = middle;
  }
  return high;
}

/**
 * Upper bound of a mean of values in [0, 1] that profits from a small variance (empirical Bernstein):
 * m + sqrt(2 V ln(2/risk) / n) + 7 ln(2/risk) / (3 (n-1)).
 * @param variance V, sample variance with n - 1
 * @see A. Maurer and M. Pontil, Empirical Bernstein bounds, COLT 2009, theorem 4
 */
export function bernsteinUpper(
  mean: number,
  variance: number,
  count: number,
  risk: number,
): number {
  requireWithin(mean, 0, 1, 'mean');
  requireNonNegative(variance, 'variance');
  requireWithin(risk, Number.MIN_VALUE, 1 - Number.EPSILON, 'risk');
  if (count < 2) return 1;
  const reach = Math.log(2 / risk);
  return Math.min(
    1,
    mean + Math.sqrt((2 * variance * reach) / count) + (7 * reach) / (3 * (count - 1)),
  );
}

/** Part of the risk spent on the first bound; the second takes the rest, so that the lesser of both is sound. */
const CHERNOFF_PART = 0.8;

/**
 * One-sided upper bound of the mean of independent values in [0, 1], whatever their distribution.
 *
 * The lesser of the Chernoff-Hoeffding bound at 4/5 of the risk and the empirical Bernstein bound at
 * 1/5 of it; by the union of the two risks the lesser one holds with the stated confidence. The first
 * is close to exact when few units matter, the second when every unit has nearly the same share.
 * A count of units that could exceed at all, bounded after Clopper and Pearson, is sound too but takes
 * every such unit as exceeding always; with fractional shares it is wider, so it is not used.
 *
 * @param mean sample mean, 0 to 1
 * @param variance sample variance with n - 1
 * @param count n
 * @param confidence such as 0.95
 * @throws RadioError `out_of_range`, `too_few`
 */
export function shareUpperBound(
  mean: number,
  variance: number,
  count: number,
  confidence = 0.95,
): ShareBound {
  const risk = 1 - requireWithin(confidence, 0.5, 1 - 1e-9, 'confidence');
  const chernoff = chernoffUpper(mean, count, CHERNOFF_PART * risk);
  const bernstein = bernsteinUpper(mean, variance, count, (1 - CHERNOFF_PART) * risk);
  return chernoff <= bernstein
    ? { upper: chernoff, method: 'chernoff-hoeffding' }
    : { upper: bernstein, method: 'empirical-bernstein' };
}
