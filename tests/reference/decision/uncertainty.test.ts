import { describe, it } from 'vitest';
import {
  counterUncertainty,
  timeBaseUncertainty,
  type CounterReading,
  type TimeBase,
} from '@shared/decision/counter-uncertainty';
import { expectCase } from './cases';
import { cases } from '../data/decision/uncertainty.json';

// Source: JCGM 100:2008, 4.2, 4.3.7, 5.1.2, 6.2, G.4, as named in each case of the data file.

interface Inputs {
  nominal_hz?: number;
  readings_hz?: number[];
  gate_s?: number;
  counter?: string;
  timebase_ppb?: number;
  timebase_form?: string;
  time_resolution_half_width_s?: number;
  ageing_limit_ppb_per_day?: number;
  days_since_calibration?: number;
  calibration_expanded_k2_ppb?: number;
  temperature_half_width_ppb?: number;
}

describe('uncertainty of a counter reading', () => {
  it.each(cases)('$id $name', (each) => {
    const inputs: Inputs = each.inputs;
    expectCase(each, inputs.readings_hz ? readingOf(inputs) : timeBaseOf(inputs));
  });
});

function readingOf(inputs: Inputs) {
  const timeBase: TimeBase =
    inputs.timebase_form === 'standard'
      ? { form: 'standard', ppb: inputs.timebase_ppb! }
      : { form: 'rectangular', ppb: inputs.timebase_ppb! };
  const counter: CounterReading['counter'] =
    inputs.counter === 'direct'
      ? { kind: 'direct' }
      : { kind: 'reciprocal', timeResolutionHalfWidthS: inputs.time_resolution_half_width_s! };
  const result = counterUncertainty({
    nominalHz: inputs.nominal_hz!,
    readingsHz: inputs.readings_hz!,
    gateS: inputs.gate_s!,
    counter,
    timeBase,
  });
  return {
    mean_hz: result.meanHz,
    offset_ppb: result.offsetPpb,
    type_a_ppb: result.typeAPpb,
    resolution_ppb: result.resolutionPpb,
    resolution_standard_ppb: result.resolutionStandardPpb,
    timebase_standard_ppb: result.timeBaseStandardPpb,
    combined_ppb: result.combinedPpb,
    expanded_k2_ppb: result.expandedK2Ppb,
    effective_degrees_of_freedom: result.effectiveDegrees,
    expanded_k2_hz: result.expandedK2Hz,
  };
}

function timeBaseOf(inputs: Inputs) {
  const result = timeBaseUncertainty({
    ageingLimitPpbPerDay: inputs.ageing_limit_ppb_per_day!,
    daysSinceCalibration: inputs.days_since_calibration!,
    calibrationExpandedPpb: inputs.calibration_expanded_k2_ppb!,
    temperatureHalfWidthPpb: inputs.temperature_half_width_ppb!,
  });
  return {
    components_ppb: [result.ageingPpb, result.calibrationPpb, result.temperaturePpb],
    standard_ppb: result.standardPpb,
    expanded_k2_ppb: result.expandedK2Ppb,
  };
}
