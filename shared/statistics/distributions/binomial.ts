import betainc from '@stdlib/math-base-special-betainc';
import { requireShare, requireWhole } from '../checks';
import { devianceTerm, stirlingRest } from '../numeric/stirling';

/**
 * P(X = k) of n independent trials with share p, by the saddle-point form, exact to about 1e-14 for any n.
 * @param k, n whole numbers; k outside 0..n gives 0
 * @param p in [0, 1]
 * @throws StatisticsError when k or n is not whole or p is outside [0, 1]
 * Source: C. Loader, Fast and Accurate Computation of Binomial Probabilities, 2000.
 */
export function binomialProbability(k: number, n: number, p: number): number {
  check(k, n, p);
  return binomialTerm(k, n, p, 1 - p);
}

/**
 * Binomial term with both shares given, so that a share next to 1 keeps its complement.
 * @param q 1 - p
 */
export function binomialTerm(k: number, n: number, p: number, q: number): number {
  if (k < 0 || k > n) return 0;
  if (p === 0) return k === 0 ? 1 : 0;
  if (q === 0) return k === n ? 1 : 0;
  if (k === 0) return Math.exp(p < 0.1 ? n * Math.log1p(-p) : n * Math.log(q));
  if (k === n) return Math.exp(q < 0.1 ? n * Math.log1p(-q) : n * Math.log(p));
  const rest = stirlingRest(n) - stirlingRest(k) - stirlingRest(n - k);
  const deviance = devianceTerm(k, n * p) + devianceTerm(n - k, n * q);
  return Math.exp(rest - deviance) * Math.sqrt(n / (2 * Math.PI * k * (n - k)));
}

/** P(X <= k), through the incomplete beta function: P(Beta(k + 1, n - k) > p). @throws as binomialProbability */
export function binomialCdf(k: number, n: number, p: number): number {
  check(k, n, p);
  if (k < 0) return 0;
  if (k >= n || p === 0) return 1;
  if (p === 1) return 0;
  return betainc(p, k + 1, n - k, true, true);
}

/** P(X > k). @throws as binomialProbability */
export function binomialUpperTail(k: number, n: number, p: number): number {
  check(k, n, p);
  if (k < 0) return 1;
  if (k >= n || p === 0) return 0;
  if (p === 1) return 1;
  return betainc(p, k + 1, n - k, true, false);
}

function check(k: number, n: number, p: number): void {
  requireWhole(k, 'k', -Infinity);
  requireWhole(n, 'n');
  requireShare(p, 'p');
}
