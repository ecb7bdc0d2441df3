import { requirePositive, requireSeries } from '../errors';
import { leastSquares } from '../least-squares';

/** offset(t) = a + b ln t. */
export interface LogLinearAgeing {
  readonly model: 'log-linear';
  aPpm: number;
  bPpmPerEFold: number;
  perDecadePpm: number;
  residualSdPpm: number;
  slopeStandardErrorPpm: number;
  degreesOfFreedom: number;
  /** (X^T X)^-1 for [1, ln t]. */
  inverseNormal: number[][];
  firstDay: number;
  lastDay: number;
}

/**
 * Log-linear ageing y = a + b ln t through one unit's offsets, ordinary least squares.
 * @param days at least three, each above zero, counted from the start of stabilisation
 * @param offsetsPpm one per day
 * @throws ResonatorError `too_few`, `lengths_differ`, `not_finite`, `out_of_range`, `no_spread`
 */
export function fitLogLinearAgeing(
  days: readonly number[],
  offsetsPpm: readonly number[],
): LogLinearAgeing {
  requireSeries(days, 'days', offsetsPpm, 'offsetsPpm', 3);
  const fit = leastSquares(
    days.map((t) => [1, Math.log(requirePositive(t, 'days'))]),
    offsetsPpm,
  );
  const [aPpm = 0, bPpmPerEFold = 0] = fit.coefficients;
  const degreesOfFreedom = days.length - 2;
  const residualSdPpm = Math.sqrt(fit.residualSumOfSquares / degreesOfFreedom);
  return {
    model: 'log-linear',
    aPpm,
    bPpmPerEFold,
    perDecadePpm: bPpmPerEFold * Math.LN10,
    residualSdPpm,
    slopeStandardErrorPpm: residualSdPpm * Math.sqrt(fit.inverseNormal[1]![1]!),
    degreesOfFreedom,
    inverseNormal: fit.inverseNormal,
    firstDay: Math.min(...days),
    lastDay: Math.max(...days),
  };
}
