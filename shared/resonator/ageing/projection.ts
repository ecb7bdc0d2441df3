import { studentTQuantile } from '../../statistics/distributions/student-t';
import { requireNonNegative, requirePositive, ResonatorError } from '../errors';
import { quadraticForm } from '../least-squares';
import { type LinearDrift, YEAR_DAYS } from './linear';
import { type LogLinearAgeing } from './log-linear';
import { type LogarithmicAgeing, logarithmicGradient, logarithmicOffsetPpm } from './logarithmic';

export type AgeingFit = LinearDrift | LogLinearAgeing | LogarithmicAgeing;

/** Stands beside every projection. */
export const MODEL_ERROR_WARNING =
  'The interval holds only if the fitted law goes on. Records of ten years show other laws, and reversals where two processes of opposite sign overlap: treat a projection far beyond the readings as a guide, not as a limit.';

export interface AgeingProjection {
  model: AgeingFit['model'];
  /** Days from the start of stabilisation. */
  atDay: number;
  offsetPpm: number;
  /** Since day zero; null for the log-linear law, which has no value there. */
  changeFromStartPpm: number | null;
  changeFromLastReadingPpm: number;
  /** Standard error of the fitted curve there. */
  standardErrorPpm: number;
  /** 95 % prediction half-width of a reading there, Student's t. */
  halfWidth95Ppm: number;
  /** Time projected over time read; above 1 it is an extrapolation. */
  spansBeyond: number;
  warning: string;
}

function row(fit: AgeingFit, day: number): number[] {
  if (fit.model === 'logarithmic') return logarithmicGradient(fit, day);
  return [1, fit.model === 'linear' ? day : Math.log(day)];
}

/** Offset of a fitted ageing law at a day, ppm. @throws ResonatorError `out_of_range` */
export function ageingOffsetPpm(fit: AgeingFit, day: number): number {
  if (fit.model === 'logarithmic') return logarithmicOffsetPpm(fit, day);
  if (fit.model === 'linear') return fit.interceptPpm + fit.driftPpmPerDay * day;
  return fit.aPpm + fit.bPpmPerEFold * Math.log(requirePositive(day, 'day'));
}

/**
 * Offset of a fitted law at a day, with its 95 % prediction half-width
 * t_{0.975, n-p} sqrt(g cov g^T + s^2), g the gradient of the law by its p constants.
 * @param atDay days from the start of stabilisation, above zero
 * @throws ResonatorError `out_of_range`, `not_finite`
 * @see NIST/SEMATECH e-Handbook of Statistical Methods, chapter 4 (from memory); exact for the two
 *   linear laws, delta method for the logarithmic one
 */
export function projectAgeing(fit: AgeingFit, atDay: number): AgeingProjection {
  requirePositive(atDay, 'atDay');
  const offsetPpm = ageingOffsetPpm(fit, atDay);
  const spreadPpm = fit.residualSdPpm;
  const relative = quadraticForm(row(fit, atDay), fit.inverseNormal);
  const t = studentTQuantile(0.975, fit.degreesOfFreedom);
  return {
    model: fit.model,
    atDay,
    offsetPpm,
    changeFromStartPpm: fit.model === 'log-linear' ? null : offsetPpm - ageingOffsetPpm(fit, 0),
    changeFromLastReadingPpm: offsetPpm - ageingOffsetPpm(fit, fit.lastDay),
    standardErrorPpm: spreadPpm * Math.sqrt(relative),
    halfWidth95Ppm: t * spreadPpm * Math.sqrt(1 + relative),
    spansBeyond: atDay / fit.lastDay,
    warning: MODEL_ERROR_WARNING,
  };
}

/** The same, `years` of 365.25 days after the start of stabilisation. */
export function projectAgeingYears(fit: AgeingFit, years: number): AgeingProjection {
  if (requireNonNegative(years, 'years') === 0) {
    throw new ResonatorError('out_of_range', 'years', 'must be above zero');
  }
  return projectAgeing(fit, years * YEAR_DAYS);
}
