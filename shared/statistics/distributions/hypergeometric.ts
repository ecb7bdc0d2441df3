import { requireWhole } from '../checks';
import { StatisticsError } from '../errors';
import { binomialTerm } from './binomial';

/**
 * P(X = k): exactly k nonconforming units in a sample drawn without replacement.
 * Formed from three binomial terms of share sampleSize/lotSize, which cancels no digits in large lots.
 * @param k nonconforming units in the sample; impossible k gives 0
 * @param lotSize, nonconforming, sampleSize whole numbers of units, the last two at most lotSize
 * @throws StatisticsError when an argument is not whole or exceeds the lot
 * Source: C. Loader 2000 (binomial form of the hypergeometric probability).
 */
export function hypergeometricProbability(
  k: number,
  lotSize: number,
  nonconforming: number,
  sampleSize: number,
): number {
  check(k, lotSize, nonconforming, sampleSize);
  const conforming = lotSize - nonconforming;
  if (k < Math.max(0, sampleSize - conforming) || k > Math.min(sampleSize, nonconforming)) return 0;
  if (sampleSize === 0 || sampleSize === lotSize) return 1;
  const p = sampleSize / lotSize;
  const q = (lotSize - sampleSize) / lotSize;
  return (
    (binomialTerm(k, nonconforming, p, q) * binomialTerm(sampleSize - k, conforming, p, q)) /
    binomialTerm(sampleSize, lotSize, p, q)
  );
}

/**
 * P(X <= k): at most k nonconforming units in the sample.
 * Summed from the largest term of the shorter tail outward by the ratio of neighbouring terms.
 * @throws as hypergeometricProbability
 */
export function hypergeometricCdf(
  k: number,
  lotSize: number,
  nonconforming: number,
  sampleSize: number,
): number {
  check(k, lotSize, nonconforming, sampleSize);
  const least = Math.max(0, sampleSize + nonconforming - lotSize);
  const most = Math.min(sampleSize, nonconforming);
  if (k < least) return 0;
  if (k >= most) return 1;
  const mean = (sampleSize * nonconforming) / lotSize;
  const conforming = lotSize - nonconforming;
  if (k < mean) {
    let term = hypergeometricProbability(k, lotSize, nonconforming, sampleSize);
    let sum = 0;
    for (let i = k; i >= least && term > sum * 1e-18; i -= 1) {
      sum += term;
      term *=
        (i * (conforming - sampleSize + i)) / ((nonconforming - i + 1) * (sampleSize - i + 1));
    }
    return Math.min(1, sum);
  }
  let term = hypergeometricProbability(k + 1, lotSize, nonconforming, sampleSize);
  let sum = 0;
  for (let i = k + 1; i <= most && term > sum * 1e-18; i += 1) {
    sum += term;
    term *=
      ((nonconforming - i) * (sampleSize - i)) / ((i + 1) * (conforming - sampleSize + i + 1));
  }
  return Math.max(0, 1 - sum);
}

function check(k: number, lotSize: number, nonconforming: number, sampleSize: number): void {
  requireWhole(k, 'k', -Infinity);
  requireWhole(lotSize, 'lotSize');
  requireWhole(nonconforming, 'nonconforming');
  requireWhole(sampleSize, 'sampleSize');
  if (nonconforming > lotSize) {
    throw new StatisticsError('out_of_range', 'nonconforming', 'cannot exceed lotSize');
  }
  if (sampleSize > lotSize) {
    throw new StatisticsError('out_of_range', 'sampleSize', 'cannot exceed lotSize');
  }
}
