import { requireFinite, requirePositive } from './errors';
import { occupiedSymbolRates, type Pulse } from './pulse';

/** Rule of thumb: one sample per symbol behind a fixed matched filter works up to this share (common practice). */
export const DEFAULT_SHARE_OF_SYMBOL_RATE = 0.15;

/** What of a receiver decides where an offset falls. */
export interface ReceiverBands {
  readonly carrierHz: number;
  readonly symbolRateHz: number;
  readonly pulse: Pulse;
  /** Two-sided bandwidth of the filter ahead of sampling, at radio frequency, Hz. */
  readonly frontEndBandwidthHz: number;
  /** Share of the symbol rate up to which one sample per symbol is held workable; 0.15 when absent. */
  readonly shareOfSymbolRate?: number;
}

/** Boundaries of |offset|, Hz. */
export interface RegimeBounds {
  /** F1 = k R: above it the matched filter loses too much. */
  symbolRateHz: number;
  /** F2 = B/2 - (1+a) R/2: up to it the whole spectrum passes the front end; below zero the front end is too narrow. */
  frontEndWholeHz: number;
  /** F3 = B/2 + (1+a) R/2: from it nothing passes the front end. */
  frontEndNothingHz: number;
  /** F_m = (1+a) R: from it nothing passes the matched filter. */
  matchedFilterNothingHz: number;
  /** min(F1, F2): end of the region of symbol-rate processing; may be below zero. */
  symbolRateRegionHz: number;
}

export type Regime = 'symbol-rate' | 'oversampled' | 'outside-front-end';

/** Finer: part or nothing of the signal left, in the matched filter or in the front end. */
export type RegimeDetail =
  | 'symbol-rate'
  | 'partly-in-matched-filter'
  | 'outside-matched-filter'
  | 'partly-in-front-end'
  | 'nothing-in-front-end';

/**
 * Boundaries of the three regions of carrier frequency offset.
 * Certain as geometry for ideal flat filters; a real filter needs its measured passband.
 * @throws RadioError `not_positive`, `not_finite`, `out_of_range`
 */
export function regimeBounds(receiver: ReceiverBands): RegimeBounds {
  requirePositive(receiver.carrierHz, 'carrierHz');
  const rate = requirePositive(receiver.symbolRateHz, 'symbolRateHz');
  const half = requirePositive(receiver.frontEndBandwidthHz, 'frontEndBandwidthHz') / 2;
  const share = requirePositive(
    receiver.shareOfSymbolRate ?? DEFAULT_SHARE_OF_SYMBOL_RATE,
    'shareOfSymbolRate',
  );
  const occupiedHz = occupiedSymbolRates(receiver.pulse) * rate;
  const symbolRateHz = share * rate;
  const frontEndWholeHz = half - occupiedHz / 2;
  return {
    symbolRateHz,
    frontEndWholeHz,
    frontEndNothingHz: half + occupiedHz / 2,
    matchedFilterNothingHz: occupiedHz,
    symbolRateRegionHz: Math.min(symbolRateHz, frontEndWholeHz),
  };
}

/** The same boundaries in ppm of the carrier. */
export function regimeBoundsPpm(receiver: ReceiverBands) {
  const bounds = regimeBounds(receiver);
  const toPpm = (hz: number) => (hz / receiver.carrierHz) * 1e6;
  return {
    symbolRatePpm: toPpm(bounds.symbolRateHz),
    frontEndWholePpm: toPpm(bounds.frontEndWholeHz),
    frontEndNothingPpm: toPpm(bounds.frontEndNothingHz),
    matchedFilterNothingPpm: toPpm(bounds.matchedFilterNothingHz),
    symbolRateRegionPpm: toPpm(bounds.symbolRateRegionHz),
  };
}

/**
 * Fewest complex samples per symbol that hold the shifted spectrum: ceil(2 x / R + 1 + a).
 * @param offsetHz any sign, Hz
 */
export function samplesPerSymbol(receiver: ReceiverBands, offsetHz: number): number {
  const x = Math.abs(requireFinite(offsetHz, 'offsetHz'));
  const rate = requirePositive(receiver.symbolRateHz, 'symbolRateHz');
  const needed = (2 * x) / rate + occupiedSymbolRates(receiver.pulse);
  // A whole number written in decimals may land a rounding above itself.
  return Math.ceil(needed * (1 - 4 * Number.EPSILON));
}

export interface RegimeOfOffset {
  regime: Regime;
  detail: RegimeDetail;
  samplesPerSymbol: number;
  offsetOverSymbolRate: number;
}

function detailOf(x: number, bounds: RegimeBounds): RegimeDetail {
  if (x <= bounds.symbolRateRegionHz) return 'symbol-rate';
  if (x <= bounds.frontEndWholeHz) {
    return x < bounds.matchedFilterNothingHz
      ? 'partly-in-matched-filter'
      : 'outside-matched-filter';
  }
  return x < bounds.frontEndNothingHz ? 'partly-in-front-end' : 'nothing-in-front-end';
}

/**
 * Where an offset falls: one sample per symbol workable; several samples per symbol with the
 * frequency corrected before the matched filter; or outside the front end, where only moving the
 * local oscillator helps. An offset on a boundary belongs to the better region.
 * @param offsetHz any sign, Hz
 * @throws RadioError `not_positive`, `not_finite`, `out_of_range`
 */
export function regimeOf(receiver: ReceiverBands, offsetHz: number): RegimeOfOffset {
  const bounds = regimeBounds(receiver);
  const x = Math.abs(requireFinite(offsetHz, 'offsetHz'));
  const detail = detailOf(x, bounds);
  const regime: Regime =
    detail === 'symbol-rate'
      ? 'symbol-rate'
      : x <= bounds.frontEndWholeHz
        ? 'oversampled'
        : 'outside-front-end';
  return {
    regime,
    detail,
    samplesPerSymbol: samplesPerSymbol(receiver, x),
    offsetOverSymbolRate: x / receiver.symbolRateHz,
  };
}
