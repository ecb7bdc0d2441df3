import { requireFinite, requireOpenShare, requirePositive } from '../checks';
import { gammaTails } from '../numeric/incomplete-gamma';
import { rootFromGuess } from '../numeric/root';
import { normalQuantile } from './normal';

/**
 * P(X <= x) of the chi-square distribution, the regularised incomplete gamma function P(degrees/2, x/2).
 * @param degrees degrees of freedom, above zero, need not be whole; x below zero gives 0
 * @throws StatisticsError when x is not finite or degrees is not above zero
 */
export function chiSquareCdf(x: number, degrees: number): number {
  requireFinite(x, 'x');
  requirePositive(degrees, 'degrees');
  return gammaTails(degrees / 2, x / 2).lower;
}

/** P(X > x) of the chi-square distribution. @throws as chiSquareCdf */
export function chiSquareUpperTail(x: number, degrees: number): number {
  requireFinite(x, 'x');
  requirePositive(degrees, 'degrees');
  return gammaTails(degrees / 2, x / 2).upper;
}

/**
 * x with P(X <= x) = p, solved on the logarithm of the smaller tail from the Wilson-Hilferty guess.
 * @param p strictly between 0 and 1
 * @throws StatisticsError when p is outside (0, 1) or degrees is not above zero
 */
export function chiSquareQuantile(p: number, degrees: number): number {
  requireOpenShare(p, 'p');
  requirePositive(degrees, 'degrees');
  const lowerTail = p <= 0.5;
  const target = Math.log(lowerTail ? p : 1 - p);
  const gap = (logX: number) => {
    const tails = gammaTails(degrees / 2, Math.exp(logX) / 2);
    const tail = lowerTail ? tails.lower : tails.upper;
    return (tail > 0 ? Math.log(tail) : -1e4) - target;
  };
  const spread = Math.sqrt(2 / (9 * degrees));
  const cubeRoot = Math.max(0.05, 1 - spread * spread + spread * normalQuantile(p));
  return Math.exp(rootFromGuess(gap, Math.log(degrees) + 3 * Math.log(cubeRoot), 0.3 * spread));
}
