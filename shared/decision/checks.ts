import { requireFinite } from '../statistics/checks';
import { StatisticsError } from '../statistics/errors';
import { type Limits } from './rule';

/** Throws unless there is a limit, each finite, the upper above the lower. */
export function requireLimits({ lowPpm, highPpm }: Limits): void {
  if (lowPpm === null && highPpm === null)
    throw new StatisticsError('limits_missing', 'limits', 'must hold at least one limit');
  if (lowPpm !== null) requireFinite(lowPpm, 'lowPpm');
  if (highPpm !== null) requireFinite(highPpm, 'highPpm');
  if (lowPpm !== null && highPpm !== null && lowPpm >= highPpm)
    throw new StatisticsError(
      'limits_crossed',
      'limits',
      'must have the upper limit above the lower one',
    );
}

/** Throws unless `value` is finite and not below zero. */
export function requireNotNegative(value: number, argument: string): void {
  requireFinite(value, argument);
  if (value < 0)
    throw new StatisticsError('out_of_range', argument, `must not be below zero, got ${value}`);
}
