import { quantileSorted as averagedStepQuantile } from 'simple-statistics';
import { requireCount, requireShare } from './checks';

/**
 * The sample quantile definitions of Hyndman and Fan, by name.
 * `linear` (their type 7) is the usual one of spreadsheets and numpy; `median-unbiased` (type 8) is the one they recommend.
 */
export const QUANTILE_TYPES = {
  'inverse-cdf': 1,
  'averaged-inverse-cdf': 2,
  'nearest-even': 3,
  'linear-inverse-cdf': 4,
  hazen: 5,
  weibull: 6,
  linear: 7,
  'median-unbiased': 8,
  'normal-unbiased': 9,
} as const;

export type QuantileType = keyof typeof QUANTILE_TYPES;

/**
 * Sample quantile of values already in ascending order.
 * Types 4 to 9: position n p + m (1-based) with m = 0, 1/2, p, 1 - p, (p+1)/3, p/4 + 3/8, interpolated between neighbours.
 * @param sorted ascending, at least one value
 * @param p in [0, 1]
 * @returns quantile in the unit of the values
 * @throws StatisticsError when empty or p is outside [0, 1]
 * Source: R. J. Hyndman and Y. Fan, Sample Quantiles in Statistical Packages, The American Statistician 50, 1996.
 */
export function quantile(sorted: Float64Array, p: number, type: QuantileType = 'linear'): number {
  requireCount(sorted.length, 'sorted', 1);
  requireShare(p, 'p');
  const n = sorted.length;
  switch (type) {
    case 'inverse-cdf':
      return at(sorted, Math.ceil(n * p));
    case 'averaged-inverse-cdf':
      // The library's typings ask for number[]; it only indexes and reads the length.
      return averagedStepQuantile(sorted as ArrayLike<number> as readonly number[], p);
    case 'nearest-even': {
      const place = n * p - 0.5;
      const whole = Math.floor(place);
      const stay = place === whole && whole % 2 === 0;
      return at(sorted, stay ? whole : whole + 1);
    }
    default: {
      const place = n * p + offset(type, p);
      const whole = Math.floor(place);
      const lower = at(sorted, whole);
      return lower + (place - whole) * (at(sorted, whole + 1) - lower);
    }
  }
}

/** Middle value, or the mean of the two middle ones. @param sorted ascending @throws StatisticsError when empty */
export function median(sorted: Float64Array): number {
  return quantile(sorted, 0.5, 'linear');
}

/** Distance of the quartiles, type 7. @param sorted ascending @throws StatisticsError when empty */
export function interquartileRange(sorted: Float64Array): number {
  return quantile(sorted, 0.75) - quantile(sorted, 0.25);
}

function offset(type: QuantileType, p: number): number {
  switch (type) {
    case 'hazen':
      return 0.5;
    case 'weibull':
      return p;
    case 'linear':
      return 1 - p;
    case 'median-unbiased':
      return (p + 1) / 3;
    case 'normal-unbiased':
      return p / 4 + 3 / 8;
    default:
      return 0;
  }
}

/** Value of 1-based rank, held at the ends. */
function at(sorted: Float64Array, rank: number): number {
  return sorted[Math.min(sorted.length, Math.max(1, rank)) - 1]!;
}
