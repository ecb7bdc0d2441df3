import { requireCount } from './checks';
import { StatisticsError } from './errors';
import { requireAllFinite } from './sorted';

/** Moments of a set of values, in the unit of the values (shape figures have none). */
export interface Moments {
  n: number;
  mean: number;
  /** Sample standard deviation, divisor n - 1. */
  sd: number;
  min: number;
  max: number;
  /** Adjusted Fisher-Pearson skewness; null below three values or without spread. */
  skewness: number | null;
  /** Unbiased excess kurtosis; null below four values or without spread. */
  excessKurtosis: number | null;
}

/**
 * Count, mean, standard deviation, extremes, skewness and excess kurtosis.
 * Two passes: the mean is taken about the first value, the powers about the mean, and what the mean missed is given back
 * (sum d^2 - (sum d)^2/n), so that 10,000,000 Hz with a spread of 0.1 Hz loses nothing.
 * G1 = g1 sqrt(n(n-1))/(n-2); G2 = (n-1)/((n-2)(n-3)) ((n+1) g2 + 6).
 * @param values two or more finite numbers
 * @throws StatisticsError when fewer than two values or one is not finite
 * Source: Chan, Golub and LeVeque 1983 (corrected two-pass); Joanes and Gill 1998 (G1, G2).
 */
export function moments(values: Float64Array): Moments {
  requireCount(values.length, 'values', 2);
  const n = values.length;
  const mean = meanAboutFirst(values);
  if (!Number.isFinite(mean)) {
    requireAllFinite(values);
    throw new StatisticsError('out_of_range', 'values', 'are too large to be added');
  }
  let min = values[0]!;
  let max = min;
  let s1 = 0;
  let s2 = 0;
  let s3 = 0;
  let s4 = 0;
  for (let i = 0; i < n; i += 1) {
    const value = values[i]!;
    if (value < min) min = value;
    else if (value > max) max = value;
    const d = value - mean;
    const d2 = d * d;
    s1 += d;
    s2 += d2;
    s3 += d2 * d;
    s4 += d2 * d2;
  }
  const missed = s1 / n;
  const m2 = Math.max(0, s2 / n - missed * missed);
  const variance = (m2 * n) / (n - 1);
  return {
    n,
    mean: mean + missed,
    sd: max > min ? Math.sqrt(variance) : 0,
    min,
    max,
    ...shape(n, missed, s2 / n, s3 / n, s4 / n, m2, max > min),
  };
}

/**
 * Correlation of each value with the next: sum (x_t - m)(x_t+1 - m) / sum (x_t - m)^2.
 * @param values two or more finite numbers in the order of measurement
 * @throws StatisticsError when fewer than two values, not finite, or without spread
 * Source: NIST StRD univariate summary statistics; Box and Jenkins 1976.
 */
export function lag1Autocorrelation(values: Float64Array): number {
  const { mean, min, max } = moments(values);
  if (max === min) {
    throw new StatisticsError('zero_spread', 'values', 'must show some spread, all values agree');
  }
  let products = 0;
  let squares = 0;
  let before = 0;
  for (let i = 0; i < values.length; i += 1) {
    const d = values[i]! - mean;
    products += d * before;
    squares += d * d;
    before = d;
  }
  return products / squares;
}

function meanAboutFirst(values: Float64Array): number {
  const first = values[0]!;
  let even = 0;
  let odd = 0;
  const pairs = values.length & ~1;
  for (let i = 0; i < pairs; i += 2) {
    even += values[i]! - first;
    odd += values[i + 1]! - first;
  }
  if (pairs < values.length) even += values[pairs]! - first;
  return first + (even + odd) / values.length;
}

/** G1 and G2 from raw power means about a point `c` below the mean. */
function shape(
  n: number,
  c: number,
  r2: number,
  r3: number,
  r4: number,
  m2: number,
  spread: boolean,
) {
  if (!spread || m2 === 0 || n < 3) return { skewness: null, excessKurtosis: null };
  const m3 = r3 - 3 * c * r2 + 2 * c * c * c;
  const m4 = r4 - 4 * c * r3 + 6 * c * c * r2 - 3 * c * c * c * c;
  const g1 = m3 / (m2 * Math.sqrt(m2));
  const g2 = m4 / (m2 * m2) - 3;
  return {
    skewness: (g1 * Math.sqrt(n * (n - 1))) / (n - 2),
    excessKurtosis: n < 4 ? null : ((n - 1) / ((n - 2) * (n - 3))) * ((n + 1) * g2 + 6),
  };
}
