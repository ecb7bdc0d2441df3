import { type SampleSummary, requireSummary } from './capability';
import { requireOpenShare, requireWhole } from './checks';
import { chiSquareQuantile, chiSquareUpperTail } from './distributions/chi-square';
import { noncentralTQuantile } from './distributions/noncentral-t';
import { normalCdf, normalDensity, normalQuantile, normalUpperTail } from './distributions/normal';
import { integrate } from './numeric/gauss-legendre';
import { rootFromGuess } from './numeric/root';

/**
 * One-sided normal tolerance factor k: with the stated confidence at least `share` of the units lies below mean + k s.
 * k = t'(confidence; n-1, z_share sqrt n)/sqrt n, t' the noncentral t quantile; exact.
 * @param n number of values, two or more; share, confidence strictly between 0 and 1
 * @throws StatisticsError when an argument is out of range
 * Source: Hahn and Meeker, Statistical Intervals, 1991, 4.6; NIST/SEMATECH e-Handbook 7.2.6.3.
 */
export function oneSidedToleranceFactor(n: number, share: number, confidence: number): number {
  check(n, share, confidence);
  const rootN = Math.sqrt(n);
  return noncentralTQuantile(confidence, n - 1, normalQuantile(share) * rootN) / rootN;
}

/**
 * Two-sided normal tolerance factor k: with the stated confidence at least `share` of the units lies within mean -/+ k s.
 * Exact: P(chi2_(n-1) > (n-1) r(x)^2/k^2) averaged over the mean x of n standard values equals the confidence, where
 * Phi(x + r) - Phi(x - r) = share.
 * @throws StatisticsError when an argument is out of range
 * Source: Wald and Wolfowitz 1946; Odeh and Owen 1980; ISO 16269-6 (exact factors).
 */
export function twoSidedToleranceFactor(n: number, share: number, confidence: number): number {
  check(n, share, confidence);
  const degrees = n - 1;
  const rootN = Math.sqrt(n);
  const reach = new Map<number, number>();
  const radiusAt = (z: number) => {
    const known = reach.get(z);
    if (known !== undefined) return known;
    const radius = coveringRadius(z / rootN, share);
    reach.set(z, radius);
    return radius;
  };
  const confidenceOf = (k: number) =>
    2 *
    integrate(
      (z) => normalDensity(z) * chiSquareUpperTail(degrees * (radiusAt(z) / k) ** 2, degrees),
      0,
      9,
      4,
    );
  // Howe's approximation is within a few per cent, so the bracket is found at once.
  const guess =
    normalQuantile((1 + share) / 2) *
    Math.sqrt(((1 + 1 / n) * degrees) / chiSquareQuantile(1 - confidence, degrees));
  const gap = (logK: number) => confidenceOf(Math.exp(logK)) - confidence;
  return Math.exp(rootFromGuess(gap, Math.log(guess), 0.02));
}

/**
 * Normal tolerance interval of a sample, in the unit of the values.
 * `upper` and `lower` are one-sided, their other end is null.
 * @throws StatisticsError when too few values, no spread, or a share is out of range
 */
export function toleranceInterval(
  summary: SampleSummary,
  share: number,
  confidence: number,
  sides: 'two' | 'lower' | 'upper' = 'two',
): { low: number | null; high: number | null; factor: number } {
  requireSummary(summary);
  const { n, mean, sd } = summary;
  const factor =
    sides === 'two'
      ? twoSidedToleranceFactor(n, share, confidence)
      : oneSidedToleranceFactor(n, share, confidence);
  return {
    low: sides === 'upper' ? null : mean - factor * sd,
    high: sides === 'lower' ? null : mean + factor * sd,
    factor,
  };
}

/** r with Phi(x + r) - Phi(x - r) = share, solved on the share left outside. */
function coveringRadius(x: number, share: number): number {
  const outside = Math.log(1 - share);
  const gap = (logR: number) => {
    const r = Math.exp(logR);
    return Math.log(normalUpperTail(x + r) + normalCdf(x - r)) - outside;
  };
  const guess = Math.max(normalQuantile((1 + share) / 2), x + normalQuantile(share));
  return Math.exp(rootFromGuess(gap, Math.log(guess), 0.05));
}

function check(n: number, share: number, confidence: number): void {
  requireWhole(n, 'n', 2);
  requireOpenShare(share, 'share');
  requireOpenShare(confidence, 'confidence');
}
