import { requireWhole } from './checks';
import { stirlingRest } from './numeric/stirling';

/** Constants of the mean and standard deviation chart of subgroups of n values. */
export interface ChartConstants {
  /** Mean of s over sigma. */
  c4: number;
  /** Limits of the mean chart: grand mean -/+ a3 times the mean s. */
  a3: number;
  /** Limits of the s chart: b3 and b4 times the mean s. */
  b3: number;
  b4: number;
}

/**
 * c4 = sqrt(2/(n-1)) Gamma(n/2)/Gamma((n-1)/2); A3 = 3/(c4 sqrt n); B3, B4 = 1 -/+ 3 sqrt(1 - c4^2)/c4, B3 not below zero.
 * @param n subgroup size, two or more
 * @throws StatisticsError when n is not a whole number of at least two
 * Source: ASTM manual on presentation of data (MNL 7); exact by the gamma function.
 */
export function chartConstants(n: number): ChartConstants {
  requireWhole(n, 'n', 2);
  const a = (n - 1) / 2;
  // Gamma(a + 1/2)/Gamma(a) with Stirling's main terms cancelled by hand: exact for large subgroups too.
  const main = a * Math.log1p(0.5 / a) - 0.5;
  const c4 = Math.exp(main + stirlingRest(a + 0.5) - stirlingRest(a));
  const spread = (3 * Math.sqrt(1 - c4 * c4)) / c4;
  return { c4, a3: 3 / (c4 * Math.sqrt(n)), b3: Math.max(0, 1 - spread), b4: 1 + spread };
}
