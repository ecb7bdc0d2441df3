import { requireSeries } from '../errors';
import { fitLinearDrift, type LinearDrift } from './linear';
import { fitLogLinearAgeing, type LogLinearAgeing } from './log-linear';
import {
  type AgeingNotDetermined,
  fitLogarithmicAgeing,
  type LogarithmicAgeing,
} from './logarithmic';
import { type AgeingFit, type AgeingProjection, projectAgeingYears } from './projection';

/** Everything that a page says about one unit's ageing. */
export interface AgeingAssessment {
  readings: number;
  spanDays: number;
  logarithmic: LogarithmicAgeing | AgeingNotDetermined;
  /** null below three readings, or with a reading at day zero. */
  logLinear: LogLinearAgeing | null;
  /** null below three readings. */
  linear: LinearDrift | null;
  /**
   * The law to project by: logarithmic where it is determined, log-linear where only the slope in
   * logarithmic time is; null, "not determined", otherwise. A straight line is never projected.
   */
  projectedBy: AgeingFit['model'] | null;
  oneYear: AgeingProjection | null;
  tenYears: AgeingProjection | null;
}

/**
 * Fits the three laws to one unit's offsets in time and projects by the one that the readings bear.
 * @param days from the start of stabilisation, zero or above
 * @param offsetsPpm one per day
 * @throws ResonatorError `too_few`, `lengths_differ`, `not_finite`, `out_of_range`
 */
export function assessAgeing(
  days: readonly number[],
  offsetsPpm: readonly number[],
): AgeingAssessment {
  requireSeries(days, 'days', offsetsPpm, 'offsetsPpm', 1);
  const logarithmic = fitLogarithmicAgeing(days, offsetsPpm);
  const enough = days.length >= 3 && new Set(days).size >= 2;
  const linear = enough ? fitLinearDrift(days, offsetsPpm) : null;
  const logLinear =
    enough && days.every((t) => t > 0) ? fitLogLinearAgeing(days, offsetsPpm) : null;
  let chosen: AgeingFit | null = null;
  if (logarithmic.state === 'determined') chosen = logarithmic;
  else if (logarithmic.reason === 'only-slope-in-log-time') chosen = logLinear;
  return {
    readings: days.length,
    spanDays: Math.max(...days) - Math.min(...days),
    logarithmic,
    logLinear,
    linear,
    projectedBy: chosen?.model ?? null,
    oneYear: chosen && projectAgeingYears(chosen, 1),
    tenYears: chosen && projectAgeingYears(chosen, 10),
  };
}
