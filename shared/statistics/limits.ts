import { StatisticsError } from './errors';

/** Limits on a value, both in its unit; null where there is none. A value on a limit conforms. */
export interface Limits {
  low: number | null;
  high: number | null;
}

/**
 * Throws unless at least one limit is given, all are finite, and low lies below high.
 * @throws StatisticsError `limits_missing`, `not_finite` or `limits_crossed`
 */
export function requireLimits({ low, high }: Limits): void {
  if (low === null && high === null) {
    throw new StatisticsError('limits_missing', 'limits', 'must give a low or a high limit');
  }
  for (const [name, value] of [
    ['limits.low', low],
    ['limits.high', high],
  ] as const) {
    if (value !== null && !Number.isFinite(value)) {
      throw new StatisticsError('not_finite', name, `must be a finite number, got ${value}`);
    }
  }
  if (low !== null && high !== null && low >= high) {
    throw new StatisticsError(
      'limits_crossed',
      'limits',
      `must have low below high, got ${low} and ${high}`,
    );
  }
}
