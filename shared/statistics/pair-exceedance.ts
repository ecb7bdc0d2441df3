import { requireCount, requireFinite, requirePositive, requireSpread } from './checks';
import { normalCdf, normalDensity, normalUpperTail } from './distributions/normal';
import { tabulatedNormalLogCdf } from './numeric/normal-log-table';
import { requireAllFinite } from './sorted';
import { StatisticsError } from './errors';

/** A normal population, in the unit of the offsets. */
export interface NormalPopulation {
  mean: number;
  sd: number;
}

/**
 * P(|A - B| > limit) for independent normal A and B: both tails of N(mean_a - mean_b, sqrt(sd_a^2 + sd_b^2)).
 * @param limit at least zero, in the unit of the offsets
 * @throws StatisticsError when an argument is not finite, both spreads are zero, or the limit is negative
 */
export function normalPairExceedance(
  a: NormalPopulation,
  b: NormalPopulation,
  limit: number,
): number {
  requireLimit(limit);
  requireFinite(a.mean, 'a.mean');
  requireFinite(b.mean, 'b.mean');
  requireFinite(a.sd, 'a.sd');
  requireFinite(b.sd, 'b.sd');
  const sd = Math.hypot(a.sd, b.sd);
  requireSpread(sd, 'a.sd');
  const mean = a.mean - b.mean;
  return normalUpperTail((limit - mean) / sd) + normalCdf((-limit - mean) / sd);
}

/**
 * P(|A - B| > limit), A normal and B uniform on -/+ halfWidth.
 * (sd/(2w)) (H((L-w-m)/sd) - H((L+w-m)/sd)) for each side, H(z) = phi(z) - z (1 - Phi(z)) the integral of the upper tail.
 * @throws StatisticsError when an argument is not finite, a spread or width is not above zero, or the limit is negative
 */
export function normalUniformExceedance(
  a: NormalPopulation,
  halfWidth: number,
  limit: number,
): number {
  requireLimit(limit);
  requireFinite(a.mean, 'a.mean');
  requireSpread(a.sd, 'a.sd');
  requirePositive(halfWidth, 'halfWidth');
  const above = (mean: number) =>
    ((tailIntegral((limit - halfWidth - mean) / a.sd) -
      tailIntegral((limit + halfWidth - mean) / a.sd)) *
      a.sd) /
    (2 * halfWidth);
  return Math.min(1, Math.max(0, above(a.mean) + above(-a.mean)));
}

/**
 * Number of pairs (one unit of each lot) with |a - b| > limit, every pair counted, in one sweep over both sorted lots.
 * @param sortedA, sortedB ascending, at least one value each
 * @returns pairs beyond, pairs in all, and their share
 * @throws StatisticsError when a lot is empty, not finite, or the limit is negative
 */
export function lotPairExceedance(
  sortedA: Float64Array,
  sortedB: Float64Array,
  limit: number,
): { beyond: number; pairs: number; share: number } {
  requireLot(sortedA, 'sortedA');
  requireLot(sortedB, 'sortedB');
  requireLimit(limit);
  let farBelow = 0;
  let notFarAbove = 0;
  let beyond = 0;
  const m = sortedB.length;
  for (let i = 0; i < sortedA.length; i += 1) {
    const a = sortedA[i]!;
    // The same subtraction as in the definition, so that a pair exactly on the limit is judged as it is written.
    while (farBelow < m && a - sortedB[farBelow]! > limit) farBelow += 1;
    while (notFarAbove < m && sortedB[notFarAbove]! - a <= limit) notFarAbove += 1;
    beyond += farBelow + (m - notFarAbove);
  }
  const pairs = sortedA.length * m;
  return { beyond, pairs, share: beyond / pairs };
}

/**
 * Share of links beyond the limit between units of a measured lot and a far end uniform on -/+ halfWidth:
 * for each unit the part of the far end's range further away than the limit, averaged.
 * @param offsets at least one value, any order
 * @throws StatisticsError when empty, not finite, the width is not above zero, or the limit is negative
 */
export function lotUniformExceedance(
  offsets: Float64Array,
  halfWidth: number,
  limit: number,
): number {
  requireLot(offsets, 'offsets');
  requirePositive(halfWidth, 'halfWidth');
  requireLimit(limit);
  let sum = 0;
  for (let i = 0; i < offsets.length; i += 1) {
    const a = Math.abs(offsets[i]!);
    const above = Math.min(2 * halfWidth, Math.max(0, a - limit + halfWidth));
    const below = Math.min(2 * halfWidth, Math.max(0, halfWidth - a - limit));
    sum += above + below;
  }
  return Math.min(1, sum / (2 * halfWidth * offsets.length));
}

/**
 * Share of links beyond the limit between units of a measured lot and a normal far end.
 * @param offsets at least one value, any order
 * @throws StatisticsError when empty, not finite, no spread, or the limit is negative
 */
export function lotNormalExceedance(
  offsets: Float64Array,
  far: NormalPopulation,
  limit: number,
): number {
  requireLot(offsets, 'offsets');
  requireFinite(far.mean, 'far.mean');
  requireSpread(far.sd, 'far.sd');
  requireLimit(limit);
  let sum = 0;
  for (let i = 0; i < offsets.length; i += 1) {
    const gap = offsets[i]! - far.mean;
    sum +=
      Math.exp(tabulatedNormalLogCdf((gap - limit) / far.sd)) +
      Math.exp(tabulatedNormalLogCdf((-gap - limit) / far.sd));
  }
  return sum / offsets.length;
}

function tailIntegral(z: number): number {
  return normalDensity(z) - z * normalUpperTail(z);
}

function requireLot(values: Float64Array, argument: string): void {
  requireCount(values.length, argument, 1);
  requireAllFinite(values, argument);
}

function requireLimit(limit: number): void {
  requireFinite(limit, 'limit');
  if (limit < 0) {
    throw new StatisticsError('out_of_range', 'limit', `must be at least zero, got ${limit}`);
  }
}
