import betainc from '@stdlib/math-base-special-betainc';
import { requireFinite, requireOpenShare, requirePositive } from '../checks';
import { rootFromGuess } from '../numeric/root';
import { normalQuantile } from './normal';

/**
 * P(X <= x) of the beta distribution, the regularised incomplete beta function I_x(a, b).
 * @param a, b shapes, above zero; x outside [0, 1] gives 0 or 1
 * @throws StatisticsError when a shape is not above zero or x is not finite
 */
export function betaCdf(x: number, a: number, b: number): number {
  check(x, a, b);
  if (x <= 0) return 0;
  if (x >= 1) return 1;
  return betainc(x, a, b, true, false);
}

/** P(X > x) of the beta distribution, not lost to rounding when small. @throws as betaCdf */
export function betaUpperTail(x: number, a: number, b: number): number {
  check(x, a, b);
  if (x <= 0) return 1;
  if (x >= 1) return 0;
  return betainc(x, a, b, true, true);
}

/**
 * x with I_x(a, b) = p.
 * @param p in [0, 1]
 * @throws StatisticsError when p is outside [0, 1] or a shape is not above zero
 */
export function betaQuantile(p: number, a: number, b: number): number {
  check(0, a, b);
  if (p === 0 || p === 1) return p;
  requireOpenShare(p, 'p');
  const logit = betaQuantileLogit(p, a, b);
  return logit < 0 ? Math.exp(logit) / (1 + Math.exp(logit)) : 1 / (1 + Math.exp(-logit));
}

/**
 * ln(x/(1 - x)) of the beta quantile x, so that values next to 0 and next to 1 keep all their digits.
 * Solved on the logarithm of the smaller tail.
 * @param p strictly between 0 and 1
 */
export function betaQuantileLogit(p: number, a: number, b: number): number {
  const lowerTail = p <= 0.5;
  const target = Math.log(lowerTail ? p : 1 - p);
  const gap = (logit: number) => {
    const tail = tailAtLogit(logit, a, b, lowerTail);
    return (tail > 0 ? Math.log(tail) : -1e4) - target;
  };
  const spread = Math.sqrt(1 / a + 1 / b);
  const guess = Math.log(a / b) + (a > 1 && b > 1 ? normalQuantile(p) * spread : 0);
  return rootFromGuess(gap, guess, spread / 4);
}

function tailAtLogit(logit: number, a: number, b: number, lower: boolean): number {
  // The argument next to 1 is never formed: its distance from 1 is used with the shapes swapped.
  const small = Math.exp(-Math.abs(logit)) / (1 + Math.exp(-Math.abs(logit)));
  return logit < 0 ? betainc(small, a, b, true, !lower) : betainc(small, b, a, true, lower);
}

function check(x: number, a: number, b: number): void {
  requireFinite(x, 'x');
  requirePositive(a, 'a');
  requirePositive(b, 'b');
}
