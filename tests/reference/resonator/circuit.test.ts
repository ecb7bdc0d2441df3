import { describe, it } from 'vitest';
import {
  crystalQuality,
  driveDependence,
  driveLevel,
  loadResonance,
  offsetByTrimSensitivityPpm,
  oscillatorLoadPf,
  pullingPpm,
} from '@shared/resonator';
import { casesOf, expectCase, type ReferenceCase } from '../radio/cases';

function computed(inputs: ReferenceCase['inputs']): Record<string, unknown> {
  if (inputs.voltage_rms_v !== undefined) {
    const level = driveLevel(
      inputs.frequency_hz,
      inputs.voltage_rms_v,
      inputs.load_resistance_ohm,
      inputs.CL_pF,
      inputs.C0_pF,
    );
    return { current_rms_a: level.currentRmsA, drive_level_w: level.powerW };
  }
  if (inputs.Ca_pF !== undefined) {
    return {
      CL_pF: oscillatorLoadPf(inputs.Ca_pF, inputs.Cb_pF, inputs.stray_pF),
      offset_for_load_error_ppm: offsetByTrimSensitivityPpm(
        0,
        inputs.trim_sensitivity_ppm_per_pF,
        inputs.load_error_pF,
      ),
    };
  }
  const crystal = {
    seriesHz: inputs.series_hz,
    motionalCapacitanceFf: inputs.C1_fF,
    shuntCapacitancePf: inputs.C0_pF,
    motionalResistanceOhm: inputs.R1_ohm,
  };
  const load = loadResonance(crystal, inputs.CL_pF);
  const quality = crystalQuality(crystal);
  return {
    load_hz_first_order: load.loadHzFirstOrder,
    load_hz_exact: load.loadHz,
    load_offset_ppm: load.loadOffsetFirstOrderPpm,
    load_offset_exact_ppm: load.loadOffsetPpm,
    trim_sensitivity_ppm_per_pF: load.trimSensitivityPpmPerPf,
    L1_henry: quality.motionalInductanceH,
    Q: quality.qualityFactor,
    parallel_hz: quality.parallelHz,
    load_resistance_ohm: load.loadResistanceOhm,
    pulling_ppm_CL_to_changed: pullingPpm(crystal, inputs.CL_pF, inputs.CL_changed_pF),
    capacitance_ratio: quality.capacitanceRatio,
    motional_time_constant_s: quality.motionalTimeConstantS,
    figure_of_merit: quality.figureOfMerit,
  };
}

describe('crystal in its circuit', () => {
  it.each(casesOf('load'))('$id: $name', (reference) => {
    expectCase(reference, computed(reference.inputs));
  });
});

describe('drive level dependence', () => {
  it.each(casesOf('dld'))('$id: $name', (reference) => {
    const { drive_uw, resistance_ohm, frequency_offset_ppm, ratio_limit } = reference.inputs;
    const result = driveDependence(drive_uw, resistance_ohm, frequency_offset_ppm, ratio_limit);
    expectCase(reference, {
      ratio_max_to_min: result.ratioMaxToMin,
      ratio_lowest_drive_to_nominal: result.ratioLowestDriveToNominal,
      frequency_span_ppm: result.frequencySpanPpm,
      within_ratio_limit: result.withinRatioLimit,
    });
  });
});
