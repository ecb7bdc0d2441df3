import { StatisticsError } from './errors';

/** Throws `not_finite` unless `value` is a finite number. */
export function requireFinite(value: number, argument: string): void {
  if (!Number.isFinite(value)) {
    throw new StatisticsError('not_finite', argument, `must be a finite number, got ${value}`);
  }
}

/** Throws unless `value` is finite and above zero. */
export function requirePositive(value: number, argument: string): void {
  requireFinite(value, argument);
  if (value <= 0) {
    throw new StatisticsError('out_of_range', argument, `must be above zero, got ${value}`);
  }
}

/** Throws unless 0 <= value <= 1. */
export function requireShare(value: number, argument: string): void {
  requireFinite(value, argument);
  if (value < 0 || value > 1) {
    throw new StatisticsError('out_of_range', argument, `must lie in [0, 1], got ${value}`);
  }
}

/** Throws unless 0 < value < 1. */
export function requireOpenShare(value: number, argument: string): void {
  requireFinite(value, argument);
  if (value <= 0 || value >= 1) {
    throw new StatisticsError(
      'out_of_range',
      argument,
      `must lie strictly between 0 and 1, got ${value}`,
    );
  }
}

/** Throws unless `value` is a whole number of at least `least`. */
export function requireWhole(value: number, argument: string, least = 0): void {
  requireFinite(value, argument);
  if (!Number.isSafeInteger(value)) {
    throw new StatisticsError('not_whole', argument, `must be a whole number, got ${value}`);
  }
  if (value < least) {
    throw new StatisticsError('out_of_range', argument, `must be at least ${least}, got ${value}`);
  }
}

/** Throws `too_few_values` unless `count` values of at least `least` are there. */
export function requireCount(count: number, argument: string, least: number): void {
  if (count < least) {
    throw new StatisticsError(
      'too_few_values',
      argument,
      `must hold at least ${least} values, got ${count}`,
    );
  }
}

/** Throws `zero_spread` when the standard deviation or width is not above zero. */
export function requireSpread(spread: number, argument: string): void {
  requireFinite(spread, argument);
  if (spread <= 0) {
    throw new StatisticsError('zero_spread', argument, 'must show some spread, all values agree');
  }
}
