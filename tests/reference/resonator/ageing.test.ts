import { describe, expect, it } from 'vitest';
import {
  fitLinearDrift,
  fitLogarithmicAgeing,
  fitLogLinearAgeing,
  logarithmicOffsetPpm,
  logarithmicRatePpmPerDay,
  projectAgeingYears,
  YEAR_DAYS,
} from '@shared/resonator';
import { studentTQuantile } from '@shared/statistics/distributions/student-t';
import { casesOf, expectCase, type ReferenceCase } from '../radio/cases';

// The cases are in ppb, the product in ppm; every law is linear in the offset.
const toPpm = (ppb: number[]) => ppb.map((value) => value / 1000);

function logarithmic({ days, offset_ppb }: ReferenceCase['inputs']) {
  const fit = fitLogarithmicAgeing(days, toPpm(offset_ppb));
  if (fit.state !== 'determined') throw new Error(fit.explanation);
  const one = projectAgeingYears(fit, 1);
  const ten = projectAgeingYears(fit, 10);
  return {
    A_ppb: fit.amplitudePpm * 1e3,
    B_per_day: fit.ratePerDay,
    f0_ppb: fit.startPpm * 1e3,
    residual_sd_ppb: fit.residualSdPpm * 1e3,
    rate_at_last_ppb_per_day: logarithmicRatePpmPerDay(fit, fit.lastDay) * 1e3,
    degrees_of_freedom: fit.degreesOfFreedom,
    change_from_start_1_year_ppb: one.changeFromStartPpm! * 1e3,
    change_from_last_reading_1_year_ppb: one.changeFromLastReadingPpm * 1e3,
    standard_error_of_mean_1_year_ppb: one.standardErrorPpm * 1e3,
    half_width_95_prediction_1_year_ppb: one.halfWidth95Ppm * 1e3,
    change_from_start_10_years_ppb: ten.changeFromStartPpm! * 1e3,
    change_from_last_reading_10_years_ppb: ten.changeFromLastReadingPpm * 1e3,
    standard_error_of_mean_10_years_ppb: ten.standardErrorPpm * 1e3,
    half_width_95_prediction_10_years_ppb: ten.halfWidth95Ppm * 1e3,
  };
}

function logLinear({ days, offset_ppb }: ReferenceCase['inputs']) {
  const fit = fitLogLinearAgeing(days, toPpm(offset_ppb));
  const one = projectAgeingYears(fit, 1);
  const ten = projectAgeingYears(fit, 10);
  return {
    a_ppb: fit.aPpm * 1e3,
    b_ppb_per_e_fold: fit.bPpmPerEFold * 1e3,
    per_decade_ppb: fit.perDecadePpm * 1e3,
    residual_sd_ppb: fit.residualSdPpm * 1e3,
    slope_standard_error_ppb: fit.slopeStandardErrorPpm * 1e3,
    t_quantile_975: studentTQuantile(0.975, fit.degreesOfFreedom),
    value_1_year_ppb: one.offsetPpm * 1e3,
    half_width_95_prediction_1_year_ppb: one.halfWidth95Ppm * 1e3,
    change_from_last_reading_1_year_ppb: one.changeFromLastReadingPpm * 1e3,
    value_10_years_ppb: ten.offsetPpm * 1e3,
    half_width_95_prediction_10_years_ppb: ten.halfWidth95Ppm * 1e3,
    change_from_last_reading_10_years_ppb: ten.changeFromLastReadingPpm * 1e3,
  };
}

function linear({ days, offset_ppb }: ReferenceCase['inputs']) {
  const fit = fitLinearDrift(days, toPpm(offset_ppb));
  return {
    intercept_ppb: fit.interceptPpm * 1e3,
    drift_ppb_per_day: fit.driftPpmPerDay * 1e3,
    residual_sd_ppb: fit.residualSdPpm * 1e3,
    drift_standard_error_ppb_per_day: fit.driftStandardErrorPpmPerDay * 1e3,
    drift_ppb_per_year_365_25: fit.driftPpmPerYear * 1e3,
  };
}

function evaluated({ A_ppb, B_per_day, f0_ppb, days }: ReferenceCase['inputs']) {
  const law = { amplitudePpm: A_ppb / 1e3, ratePerDay: B_per_day, startPpm: f0_ppb / 1e3 };
  return {
    offset_ppb: days.map((t: number) => logarithmicOffsetPpm(law, t) * 1e3),
    rate_ppb_per_day: days.map((t: number) => logarithmicRatePpmPerDay(law, t) * 1e3),
  };
}

function computed(reference: ReferenceCase): Record<string, unknown> {
  if (reference.inputs.year_days) expect(reference.inputs.year_days).toBe(YEAR_DAYS);
  if (reference.name.startsWith('logarithmic fit')) return logarithmic(reference.inputs);
  if (reference.name.startsWith('log-linear fit')) return logLinear(reference.inputs);
  if (reference.name.startsWith('linear drift')) return linear(reference.inputs);
  return evaluated(reference.inputs);
}

describe('ageing', () => {
  it.each(casesOf('ageing'))('$id: $name', (reference) => {
    expectCase(reference, computed(reference));
  });
});
