import { requireFinite, requireOpenShare } from '../checks';
import { StatisticsError } from '../errors';
import { integrate } from '../numeric/gauss-legendre';
import { rootFromGuess } from '../numeric/root';
import { logExcess, stirlingRest } from '../numeric/stirling';
import { normalCdf, normalQuantile } from './normal';
import { studentTCdf, studentTQuantile } from './student-t';

/** Below exp(-DEPTH) of its peak the chi density adds nothing that a double can show. */
const DEPTH = 80;

/**
 * P(T <= t) of the noncentral t distribution: integral over s of Phi(t s - delta) times the density of
 * s = sqrt(chi-square/degrees), by 20-point Gauss-Legendre panels laid over the density and over the step of Phi.
 * @param t finite
 * @param degrees degrees of freedom, at least 1
 * @param delta noncentrality, finite
 * @returns probability, absolute error about 1e-14, relative error about 1e-11 in small lower tails
 * @throws StatisticsError when an argument is not finite or degrees is below 1
 * Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2, 1995, chapter 31.
 */
export function noncentralTCdf(t: number, degrees: number, delta: number): number {
  check(t, degrees, delta);
  if (delta === 0) return studentTCdf(t, degrees);
  if (t === 0) return normalCdf(-delta);
  const density = chiDensity(degrees);
  const { low, high } = chiRange(degrees);
  const width = 1 / Math.sqrt(2 * degrees);
  const integrand = (s: number) => normalCdf(t * s - delta) * density(s);
  // Phi climbs from nothing to one within 9 sigma of s = delta/t: panels there follow its width.
  const clamp = (s: number) => Math.min(high, Math.max(low, s));
  const edges = [low, clamp((delta - 9) / t), clamp((delta + 9) / t), high].sort((x, y) => x - y);
  const widest = [3 * width, Math.min(3 * width, 3 / Math.abs(t)), 3 * width];
  let sum = 0;
  for (let i = 0; i < 3; i += 1) {
    const from = edges[i]!;
    const to = edges[i + 1]!;
    if (to > from) sum += integrate(integrand, from, to, Math.ceil((to - from) / widest[i]!));
  }
  return Math.min(1, Math.max(0, sum));
}

/** P(T > t) = P(T' <= -t) with the noncentrality reversed, so that small upper tails stay exact. @throws as noncentralTCdf */
export function noncentralTUpperTail(t: number, degrees: number, delta: number): number {
  return noncentralTCdf(-t, degrees, -delta);
}

/**
 * t with P(T <= t) = p.
 * @param p strictly between 0 and 1
 * @throws StatisticsError as noncentralTCdf, or when p is outside (0, 1)
 */
export function noncentralTQuantile(p: number, degrees: number, delta: number): number {
  check(0, degrees, delta);
  requireOpenShare(p, 'p');
  if (delta === 0) return studentTQuantile(p, degrees);
  // From the lower half only: the other half is its mirror image, and its tail would lose digits.
  if (p > 0.5) return -lowerQuantile(1 - p, degrees, -delta);
  return lowerQuantile(p, degrees, delta);
}

/**
 * Noncentrality delta with P(T <= t) = p, the step behind exact bounds on a normal share.
 * @param p strictly between 0 and 1
 * @throws StatisticsError as noncentralTCdf, or when p is outside (0, 1)
 */
export function noncentralityFor(t: number, degrees: number, p: number): number {
  check(t, degrees, 0);
  requireOpenShare(p, 'p');
  const z = normalQuantile(p);
  const spread = Math.sqrt(1 + (t * t) / (2 * degrees));
  const gap =
    p <= 0.5
      ? (delta: number) => logOf(noncentralTCdf(t, degrees, delta)) - Math.log(p)
      : (delta: number) => Math.log(1 - p) - logOf(noncentralTUpperTail(t, degrees, delta));
  return rootFromGuess(gap, t - z * spread, spread / 8);
}

function lowerQuantile(p: number, degrees: number, delta: number): number {
  const z = normalQuantile(p);
  const spread = Math.sqrt(1 + (delta * delta) / (2 * degrees));
  const target = Math.log(p);
  const gap = (t: number) => logOf(noncentralTCdf(t, degrees, delta)) - target;
  return rootFromGuess(gap, delta + z * spread, spread / 8);
}

function logOf(probability: number): number {
  return probability > 0 ? Math.log(probability) : -1e4;
}

/** Density of s = sqrt(chi-square/degrees): sqrt(degrees/pi)/s exp(-degrees/2 (u - ln(1+u)) - rest), u = s^2 - 1. */
export function chiDensity(degrees: number): (s: number) => number {
  const scale = Math.sqrt(degrees / Math.PI) * Math.exp(-stirlingRest(degrees / 2));
  const half = degrees / 2;
  return (s) => (scale / s) * Math.exp(-half * logExcess((s - 1) * (s + 1), s * s));
}

/** The stretch of s outside which the density of chiDensity has vanished. */
export function chiRange(degrees: number): { low: number; high: number } {
  // u - ln(1+u) >= u^2/2 - u^3/3 for u > 0 and >= u^2/2 for u < 0; s = sqrt(1+u) at the depth wanted.
  const reach = (2 * DEPTH) / degrees;
  const low = Math.sqrt(Math.max(0, 1 - Math.sqrt(2 * reach)));
  const high = Math.sqrt(1 + reach + Math.sqrt(2 * reach));
  return { low, high };
}

function check(t: number, degrees: number, delta: number): void {
  requireFinite(t, 't');
  requireFinite(degrees, 'degrees');
  requireFinite(delta, 'delta');
  if (degrees < 1) {
    throw new StatisticsError('out_of_range', 'degrees', `must be at least 1, got ${degrees}`);
  }
}
