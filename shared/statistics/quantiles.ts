import { medianSorted } from 'simple-statistics';
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
  const np = unrounded(sorted.length * p);
  switch (type) {
    case 'inverse-cdf':
      return at(sorted, Math.ceil(np));
    case 'averaged-inverse-cdf':
      return (at(sorted, Math.ceil(np)) + at(sorted, Math.floor(np) + 1)) / 2;
    case 'nearest-even': {
      const whole = Math.floor(np - 0.5);
      const stay = np - 0.5 === whole && whole % 2 === 0;
      return at(sorted, stay ? whole : whole + 1);
    }
    default: {
      const place = unrounded(np + offset(type, p));
      const whole = Math.floor(place);
      const lower = at(sorted, whole);
      return lower + (place - whole) * (at(sorted, whole + 1) - lower);
    }
  }
}

/** Middle value, or the mean of the two middle ones. @param sorted ascending @throws StatisticsError when empty */
export function median(sorted: Float64Array): number {
  requireCount(sorted.length, 'sorted', 1);
  // The library's typings ask for number[]; it only indexes and reads the length.
  return medianSorted(sorted as ArrayLike<number> as readonly number[]);
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

/** 0.07 times 100 is a hair above 7: a position that near a whole or half number is meant to be it. */
function unrounded(place: number): number {
  const near = Math.round(2 * place) / 2;
  return Math.abs(place - near) <= 4 * Number.EPSILON * Math.abs(near) ? near : place;
}

/** Value of 1-based rank, held at the ends. */
function at(sorted: Float64Array, rank: number): number {
  return sorted[Math.min(sorted.length, Math.max(1, rank)) - 1]!;
}
