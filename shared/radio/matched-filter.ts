import { requireFinite, requirePositive } from './errors';
import { type Pulse, requirePulse, rootRaisedCosineSpectrum } from './pulse';
import { breakpointsWithin, integratePieces } from './pieces';

/** What the matched filter leaves of a signal that arrives off frequency. Powers are 1 at no offset. */
export interface MatchedFilterLoss {
  /** Power of the wanted symbol at its ideal instant: what counts when noise dominates. */
  correlationPeakPower: number;
  /** Mean signal power behind the filter, averaged over timing; counts intersymbol interference as signal. */
  outputEnergyFraction: number;
  /** Power of all symbols at the ideal instants: wanted and interference. */
  symbolRatePower: number;
  /** Power of the interference of other symbols at the ideal instant. */
  interferencePower: number;
  /** The same in dB; null where the value is zero. */
  correlationPeakDb: number | null;
  outputEnergyDb: number | null;
  /** Wanted symbol over interference, dB; null where either is zero. */
  signalToInterferenceDb: number | null;
}

const toDb = (power: number): number | null => (power > 0 ? 10 * Math.log10(power) : null);

/** Below this share of the wanted power, interference is rounding, not signal. */
const ROUNDING = 1e-28;

function lossOf(correlation: number, energy: number, interference: number): MatchedFilterLoss {
  const wanted = Math.min(1, correlation ** 2);
  const interferencePower = interference > ROUNDING * wanted ? interference : 0;
  return {
    correlationPeakPower: wanted,
    outputEnergyFraction: Math.min(1, energy),
    symbolRatePower: wanted + interferencePower,
    interferencePower,
    correlationPeakDb: toDb(wanted),
    outputEnergyDb: toDb(Math.min(1, energy)),
    signalToInterferenceDb:
      wanted > 0 && interferencePower > 0 ? toDb(wanted / interferencePower) : null,
  };
}

/** Integrate and dump: sinc^2(d) and 6 (1 - sin w / w) / w^2 with w = 2 pi d; no neighbour is heard. */
function rectangularLoss(offset: number): MatchedFilterLoss {
  const half = Math.PI * offset;
  const correlation = offset === 0 ? 1 : Math.sin(half) / half;
  const square = (2 * half) ** 2;
  const energy =
    square < 0.01
      ? 1 - (square / 20) * (1 - (square / 42) * (1 - square / 72))
      : (6 * (1 - Math.sin(2 * half) / (2 * half))) / square;
  return lossOf(Number.isInteger(offset) && offset !== 0 ? 0 : correlation, energy, 0);
}

function rootRaisedCosineLoss(offset: number, rollOff: number): MatchedFilterLoss {
  const edge = (1 + rollOff) / 2;
  if (offset >= 2 * edge) return lossOf(0, 0, 0);
  if (offset === 0) return lossOf(1, 1, 0);
  const product = (f: number) =>
    rootRaisedCosineSpectrum(f - offset, rollOff) * rootRaisedCosineSpectrum(f, rollOff);

  const low = offset - edge;
  const corners = [-edge, edge - 1, 1 - edge, edge];
  const kinks = [...corners, ...corners.map((x) => x + offset)];
  const pieces = breakpointsWithin(low, edge, kinks);
  const correlation = integratePieces(pieces, product);
  const energy = integratePieces(pieces, (f) => product(f) ** 2) / (1 - rollOff / 4);

  // The samples' spectrum repeats every symbol rate. Its departure from its own mean is the
  // interference: integrating the square of that departure cancels nothing, unlike P - L_c.
  // The product is at most two symbol rates wide, so two of its copies meet at most.
  const foldedKinks = breakpointsWithin(
    low,
    low + 1,
    kinks.flatMap((x) => [x - 1, x]),
  );
  const interference = integratePieces(
    foldedKinks,
    (f) => (product(f) + product(f + 1) - correlation) ** 2,
  );
  return lossOf(correlation, energy, interference);
}

/**
 * Matched-filter loss of a linear modulation at a carrier frequency offset.
 *
 * With d = offset / symbol rate and the unit-energy spectrum G:
 * correlation peak L_c = (integral G(f-d) G(f) df)^2; output energy
 * L_e = integral G(f-d)^2 G(f)^2 df / (1 - a/4); interference at the ideal instant
 * integral over one period of (sum_k H(f+k) - sqrt(L_c))^2, H = G(f-d) G(f).
 * All vanish at |d| >= 1 + a. Rectangular pulse: closed forms, no interference.
 *
 * @param pulse root raised cosine of any roll-off, or rectangular
 * @param offsetOverSymbolRate d, any sign, in symbol rates
 * @throws RadioError `not_finite`, `out_of_range`
 * @see closed forms at a = 0 and a = 1, table of the reference checks; Parseval
 */
export function matchedFilterLoss(pulse: Pulse, offsetOverSymbolRate: number): MatchedFilterLoss {
  requirePulse(pulse);
  const offset = Math.abs(requireFinite(offsetOverSymbolRate, 'offsetOverSymbolRate'));
  return pulse.shape === 'rectangular'
    ? rectangularLoss(offset)
    : rootRaisedCosineLoss(offset, pulse.rollOff);
}

export interface SymbolRateSinr {
  /** Signal to interference and noise at the ideal instant, dB; null when no signal is left. */
  sinrDb: number | null;
  /** Es/N0 minus that, dB; null when no signal is left. */
  degradationDb: number | null;
}

/**
 * Signal to interference and noise of symbol-rate samples, carrier phase tracked:
 * L_c / (P_isi + N0/Es).
 * @param symbolEnergyToNoiseDb Es/N0 at no offset, dB
 * @throws RadioError `not_finite`, `out_of_range`
 */
export function symbolRateSinr(
  pulse: Pulse,
  offsetOverSymbolRate: number,
  symbolEnergyToNoiseDb: number,
): SymbolRateSinr {
  const noise = 10 ** (-requireFinite(symbolEnergyToNoiseDb, 'symbolEnergyToNoiseDb') / 10);
  const { correlationPeakPower, interferencePower } = matchedFilterLoss(
    pulse,
    offsetOverSymbolRate,
  );
  const sinrDb = toDb(correlationPeakPower / (interferencePower + noise));
  return { sinrDb, degradationDb: sinrDb === null ? null : symbolEnergyToNoiseDb - sinrDb };
}

export interface MatchedFilterPoint extends MatchedFilterLoss {
  offsetOverSymbolRate: number;
}

/** The loss at each offset, for a drawing: 300 points take about a hundredth of a second. */
export function matchedFilterCurve(
  pulse: Pulse,
  offsetsOverSymbolRate: readonly number[],
): MatchedFilterPoint[] {
  return offsetsOverSymbolRate.map((offsetOverSymbolRate) => ({
    offsetOverSymbolRate,
    ...matchedFilterLoss(pulse, offsetOverSymbolRate),
  }));
}

/**
 * The least offset, in symbol rates, that costs a given correlation loss.
 * The loss grows with |d| up to the first null, so bisection finds it to the last digits.
 * @param lossDb above zero, such as 0.5 for half a decibel
 * @throws RadioError `not_positive`, `out_of_range`
 */
export function offsetForLoss(pulse: Pulse, lossDb: number): number {
  requirePulse(pulse);
  const target = 10 ** (-requirePositive(lossDb, 'lossDb') / 10);
  let low = 0;
  let high = pulse.shape === 'rectangular' ? 1 : 1 + pulse.rollOff;
  for (let step = 0; step < 60; step += 1) {
    const middle = (low + high) / 2;
    if (matchedFilterLoss(pulse, middle).correlationPeakPower > target) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
