import { requireOpenShare, requireSpread, requireWhole, requireFinite } from './checks';
import { chiSquareQuantile } from './distributions/chi-square';
import { noncentralityFor } from './distributions/noncentral-t';
import { type Limits, requireLimits } from './limits';

/** Mean and sample standard deviation of n values. */
export interface SampleSummary {
  n: number;
  mean: number;
  sd: number;
}

/** Overall performance indices; pp needs both limits and is null otherwise. */
export interface Capability {
  pp: number | null;
  ppk: number;
  /** One-sided lower confidence bounds of the same. */
  ppLowerBound: number | null;
  ppkLowerBound: number;
}

/**
 * Pp = (high - low)/(6 s) and Ppk = distance of the mean to the nearer limit over 3 s, with lower confidence bounds.
 * Bound of Pp: Pp sqrt(chi2(1 - confidence; n-1)/(n-1)), exact. Bound of Ppk: noncentral t of the nearer limit, exact for
 * one limit; with two it still holds at no less than the confidence, since the true Ppk is one of the two sides.
 * @param summary n >= 2 values of normal kind, sd above zero
 * @param confidence strictly between 0 and 1
 * @throws StatisticsError when too few values, no spread, limits missing or crossed
 * Source: ISO 22514-2; Kotz and Johnson, Process Capability Indices, 1993 (bounds).
 */
export function capability(summary: SampleSummary, limits: Limits, confidence = 0.95): Capability {
  const { n, mean, sd } = summary;
  requireSummary(summary);
  requireLimits(limits);
  requireOpenShare(confidence, 'confidence');
  const { low, high } = limits;
  const distances = [
    ...(low === null ? [] : [(mean - low) / sd]),
    ...(high === null ? [] : [(high - mean) / sd]),
  ];
  const nearest = Math.min(...distances);
  const rootN = Math.sqrt(n);
  const pp = low === null || high === null ? null : (high - low) / (6 * sd);
  return {
    pp,
    ppk: nearest / 3,
    ppLowerBound:
      pp === null ? null : pp * Math.sqrt(chiSquareQuantile(1 - confidence, n - 1) / (n - 1)),
    ppkLowerBound: noncentralityFor(nearest * rootN, n - 1, confidence) / (3 * rootN),
  };
}

/** Throws unless the summary is of two or more values with finite mean and some spread. */
export function requireSummary({ n, mean, sd }: SampleSummary, least = 2): void {
  requireWhole(n, 'summary.n', least);
  requireFinite(mean, 'summary.mean');
  requireSpread(sd, 'summary.sd');
}
