import betainc from '@stdlib/math-base-special-betainc';
import { requireFinite, requireOpenShare, requirePositive } from '../checks';
import { betaQuantileLogit } from './beta';

/**
 * P(T <= t) of Student's t distribution, through I_w(1/2, degrees/2) with w = t^2/(degrees + t^2).
 * @param degrees degrees of freedom, above zero, need not be whole
 * @throws StatisticsError when t is not finite or degrees is not above zero
 * Source: Abramowitz and Stegun 1964, 26.7.1.
 */
export function studentTCdf(t: number, degrees: number): number {
  requireFinite(t, 't');
  requirePositive(degrees, 'degrees');
  const tail = 0.5 * tailBeyond(t * t, degrees);
  return t > 0 ? 1 - tail : tail;
}

/** P(T > t), with full relative precision in the tail. @throws as studentTCdf */
export function studentTUpperTail(t: number, degrees: number): number {
  return studentTCdf(-t, degrees);
}

/**
 * t with P(T <= t) = p.
 * @param p strictly between 0 and 1
 * @throws StatisticsError when p is outside (0, 1) or degrees is not above zero
 */
export function studentTQuantile(p: number, degrees: number): number {
  requireOpenShare(p, 'p');
  requirePositive(degrees, 'degrees');
  if (p === 0.5) return 0;
  const tail = Math.min(p, 1 - p);
  // Two-sided tail 2*tail = I_x(degrees/2, 1/2) with x/(1-x) = degrees/t^2; near the centre its complement is solved.
  const logRatio =
    tail < 0.25
      ? betaQuantileLogit(2 * tail, degrees / 2, 0.5)
      : -betaQuantileLogit(1 - 2 * tail, 0.5, degrees / 2);
  const t = Math.sqrt(degrees) * Math.exp(-0.5 * logRatio);
  return p < 0.5 ? -t : t;
}

/** P(T^2 > tSquared). */
function tailBeyond(tSquared: number, degrees: number): number {
  if (tSquared < degrees) {
    return betainc(tSquared / (degrees + tSquared), 0.5, degrees / 2, true, true);
  }
  return betainc(degrees / (degrees + tSquared), degrees / 2, 0.5, true, false);
}
