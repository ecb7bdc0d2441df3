import { describe, expect, it } from 'vitest';
import {
  atCutCurve,
  cubicOffsetPpm,
  equalRippleAngle,
  fitCubic,
  forkOffsetPpm,
  inflectionC,
  offsetExtremes,
  secondsPerDay,
  turningPointsC,
} from '@shared/resonator';
import { casesOf, expectCase, type ReferenceCase } from '../radio/cases';

const turningPoints = (points: number[]) => (points.length > 0 ? points : null);

function computed(inputs: ReferenceCase['inputs']): Record<string, unknown> {
  if (inputs.measured_ppm) {
    const fit = fitCubic(inputs.temperatures_c, inputs.measured_ppm, inputs.reference_c);
    return {
      offset_ppm_at_reference: fit.offsetPpm,
      a1_ppm_per_k: fit.a1PpmPerK,
      a2_ppm_per_k2: fit.a2PpmPerK2,
      a3_ppm_per_k3: fit.a3PpmPerK3,
      residual_sd_ppm: fit.residualSdPpm,
      inflection_c: inflectionC(fit),
    };
  }
  if (inputs.half_range_k) {
    const angle = equalRippleAngle(
      inputs.a3_per_k3 * 1e6,
      inputs.half_range_k,
      inputs.a1_sensitivity_per_k_per_degree * 1e6,
    );
    return {
      best_a1_per_k: angle.a1PpmPerK * 1e-6,
      peak_ppm: angle.peakPpm,
      turning_points_from_inflection_k: angle.turningPointsFromInflectionK,
      angle_difference_arcmin: angle.angleDifferenceArcmin,
    };
  }
  if (inputs.angle_difference_arcmin === undefined) {
    const curve = {
      referenceC: inputs.reference_c,
      offsetPpm: 0,
      a1PpmPerK: inputs.a1_per_k * 1e6,
      a2PpmPerK2: inputs.a2_per_k2 * 1e6,
      a3PpmPerK3: inputs.a3_per_k3 * 1e6,
    };
    return {
      ppm: cubicOffsetPpm(curve, inputs.temperature_c),
      turning_points_c: turningPoints(turningPointsC(curve)),
      inflection_c: inflectionC(curve),
    };
  }
  const curve = atCutCurve(inputs.angle_difference_arcmin, inputs.reference_c);
  const extremes = offsetExtremes(curve, inputs.range_low_c, inputs.range_high_c);
  return {
    a1_per_k: curve.a1PpmPerK * 1e-6,
    a2_per_k2: curve.a2PpmPerK2 * 1e-6,
    a3_per_k3: curve.a3PpmPerK3 * 1e-6,
    ppm: inputs.temperatures_c.map((t: number) => cubicOffsetPpm(curve, t)),
    turning_points_c: turningPoints(turningPointsC(curve)),
    inflection_c: inflectionC(curve),
    max_ppm_in_range: extremes.greatestPpm,
    min_ppm_in_range: extremes.leastPpm,
  };
}

describe('AT cut over temperature', () => {
  it.each(casesOf('at-cut'))('$id: $name', (reference) => {
    expectCase(reference, computed(reference.inputs));
  });

  it('least squares returns the cubic that made the readings', () => {
    const curve = atCutCurve(3);
    const temperatures = [-40, -25, -10, 5, 20, 35, 50, 65, 85];
    const fit = fitCubic(
      temperatures,
      temperatures.map((t) => cubicOffsetPpm(curve, t)),
    );
    expect(fit.a1PpmPerK / curve.a1PpmPerK).toBeCloseTo(1, 11);
    expect(fit.a3PpmPerK3 / curve.a3PpmPerK3).toBeCloseTo(1, 11);
  });
});

describe('tuning fork over temperature', () => {
  it.each(casesOf('fork'))('$id: $inputs', (reference) => {
    const { temperature_c, beta_ppm_per_k2, turnover_c } = reference.inputs;
    const ppm = forkOffsetPpm(temperature_c, beta_ppm_per_k2, turnover_c);
    expectCase(reference, { ppm, seconds_per_day: secondsPerDay(ppm) });
  });
});
