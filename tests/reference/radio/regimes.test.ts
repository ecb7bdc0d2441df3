import { describe, it } from 'vitest';
import {
  type Regime,
  type RegimeDetail,
  regimeBounds,
  regimeBoundsPpm,
  regimeOf,
} from '@shared/radio';
import { casesOf, expectCase } from './cases';

const REGIME: Record<Regime, string> = {
  'symbol-rate': 'symbol-rate',
  oversampled: 'oversampled',
  'outside-front-end': 'outside front end',
};

const DETAIL: Record<RegimeDetail, string> = {
  'symbol-rate': '1',
  'partly-in-matched-filter': '2a partly inside matched filter',
  'outside-matched-filter': '2b outside matched filter',
  'partly-in-front-end': '3a partly cut',
  'nothing-in-front-end': '3b nothing left',
};

describe('region of a carrier frequency offset', () => {
  it.each(casesOf('regime'))('$id: $inputs', (reference) => {
    const { inputs } = reference;
    const receiver = {
      carrierHz: inputs.carrier_hz,
      symbolRateHz: inputs.symbol_rate_hz,
      pulse: { shape: 'root-raised-cosine', rollOff: inputs.rolloff } as const,
      frontEndBandwidthHz: inputs.front_end_bandwidth_hz,
      shareOfSymbolRate: inputs.symbol_rate_fraction,
    };
    const bounds = regimeBounds(receiver);
    const ppm = regimeBoundsPpm(receiver);
    const { regime, detail, samplesPerSymbol, offsetOverSymbolRate } = regimeOf(
      receiver,
      inputs.offset_hz,
    );
    expectCase(reference, {
      regime: REGIME[regime],
      sub_regime: DETAIL[detail],
      bound_symbol_rate_hz: bounds.symbolRateHz,
      bound_front_end_whole_hz: bounds.frontEndWholeHz,
      bound_front_end_nothing_hz: bounds.frontEndNothingHz,
      bound_matched_filter_nothing_hz: bounds.matchedFilterNothingHz,
      bound_symbol_rate_ppm: ppm.symbolRatePpm,
      bound_front_end_whole_ppm: ppm.frontEndWholePpm,
      min_complex_samples_per_symbol: samplesPerSymbol,
      offset_over_symbol_rate: offsetOverSymbolRate,
    });
  });
});
