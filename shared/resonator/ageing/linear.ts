import { requireSeries } from '../errors';
import { leastSquares } from '../least-squares';

/** Days in a year of every projection here: 365.25. */
export const YEAR_DAYS = 365.25;

/** offset(t) = intercept + drift t. */
export interface LinearDrift {
  readonly model: 'linear';
  interceptPpm: number;
  driftPpmPerDay: number;
  driftPpmPerYear: number;
  residualSdPpm: number;
  driftStandardErrorPpmPerDay: number;
  degreesOfFreedom: number;
  /** (X^T X)^-1 for [1, t]. */
  inverseNormal: number[][];
  firstDay: number;
  lastDay: number;
}

/**
 * Straight line through one unit's offsets in time, ordinary least squares.
 * For short spans and for ovens in steady state; it must not be carried beyond the span without saying so.
 * @param days at least three
 * @param offsetsPpm one per day
 * @throws ResonatorError `too_few`, `lengths_differ`, `not_finite`, `no_spread`
 */
export function fitLinearDrift(
  days: readonly number[],
  offsetsPpm: readonly number[],
): LinearDrift {
  requireSeries(days, 'days', offsetsPpm, 'offsetsPpm', 3);
  const fit = leastSquares(
    days.map((t) => [1, t]),
    offsetsPpm,
  );
  const [interceptPpm = 0, driftPpmPerDay = 0] = fit.coefficients;
  const degreesOfFreedom = days.length - 2;
  const residualSdPpm = Math.sqrt(fit.residualSumOfSquares / degreesOfFreedom);
  return {
    model: 'linear',
    interceptPpm,
    driftPpmPerDay,
    driftPpmPerYear: driftPpmPerDay * YEAR_DAYS,
    residualSdPpm,
    driftStandardErrorPpmPerDay: residualSdPpm * Math.sqrt(fit.inverseNormal[1]![1]!),
    degreesOfFreedom,
    inverseNormal: fit.inverseNormal,
    firstDay: Math.min(...days),
    lastDay: Math.max(...days),
  };
}
