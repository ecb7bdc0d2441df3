import { requireCount, requireFinite, requireSpread } from './checks';
import { tabulatedNormalLogCdf } from './numeric/normal-log-table';

/** Anderson-Darling test of normality with mean and standard deviation estimated. */
export interface NormalityTest {
  /** A^2, no unit. */
  a2: number;
  /** A^2 (1 + 0.75/n + 2.25/n^2). */
  a2Adjusted: number;
  /** Chance of a statistic this large from normal values. */
  p: number;
}

/**
 * Anderson-Darling test of normality, mean and standard deviation taken from the values.
 * A^2 = -n - (1/n) sum (2i - 1)(ln Phi(z_i) + ln(1 - Phi(z_(n+1-i)))); p by Stephens' formulas for the adjusted statistic.
 * @param sorted eight or more values in ascending order
 * @param mean, sd of the same values
 * @throws StatisticsError when fewer than eight values or no spread
 * Source: D'Agostino and Stephens, Goodness-of-Fit Techniques, 1986, tables 4.7 and 4.9.
 */
export function andersonDarling(sorted: Float64Array, mean: number, sd: number): NormalityTest {
  requireCount(sorted.length, 'sorted', 8);
  requireFinite(mean, 'mean');
  requireSpread(sd, 'sd');
  const n = sorted.length;
  let sum = 0;
  for (let i = 0; i < n; i += 1) {
    const z = (sorted[i]! - mean) / sd;
    sum += (2 * i + 1) * tabulatedNormalLogCdf(z) + (2 * (n - i) - 1) * tabulatedNormalLogCdf(-z);
  }
  const a2 = -n - sum / n;
  const a2Adjusted = a2 * (1 + 0.75 / n + 2.25 / (n * n));
  return { a2, a2Adjusted, p: stephensP(a2Adjusted) };
}

/** p of the adjusted statistic, D'Agostino and Stephens table 4.9. */
function stephensP(a: number): number {
  if (a < 0.2) return 1 - Math.exp(-13.436 + 101.14 * a - 223.73 * a * a);
  if (a < 0.34) return 1 - Math.exp(-8.318 + 42.796 * a - 59.938 * a * a);
  if (a < 0.6) return Math.exp(0.9177 - 4.279 * a - 1.38 * a * a);
  // Past its turning point near 153 the published parabola would rise again; by then p is below 1e-190.
  if (a < 150) return Math.exp(1.2937 - 5.709 * a + 0.0186 * a * a);
  return 0;
}
