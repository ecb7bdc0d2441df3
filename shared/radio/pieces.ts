import { integrate } from '../statistics/numeric/gauss-legendre';

/**
 * Integral over consecutive intervals between sorted breakpoints, 20 Gauss-Legendre points each.
 * Exact to rounding for an integrand that is smooth between its breakpoints.
 */
export function integratePieces(
  breakpoints: readonly number[],
  integrand: (x: number) => number,
): number {
  let sum = 0;
  for (let i = 1; i < breakpoints.length; i += 1) {
    sum += integrate(integrand, breakpoints[i - 1]!, breakpoints[i]!, 1);
  }
  return sum;
}

/** The given points that lie strictly inside [low, high], sorted, with both ends. */
export function breakpointsWithin(low: number, high: number, points: readonly number[]): number[] {
  const inside = points.filter((x) => x > low && x < high).sort((a, b) => a - b);
  return [low, ...inside.filter((x, i) => i === 0 || x > inside[i - 1]!), high];
}
