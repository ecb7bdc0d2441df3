import { RadioError, requireWithin } from './errors';

/** The transmit pulse: root raised cosine of a roll-off from 0 to 1, or rectangular (integrate and dump). */
export type Pulse =
  | { readonly shape: 'root-raised-cosine'; readonly rollOff: number }
  | { readonly shape: 'rectangular' };

/** @throws RadioError when the roll-off lies outside 0 to 1 */
export function requirePulse(pulse: Pulse): Pulse {
  if (pulse.shape === 'root-raised-cosine') requireWithin(pulse.rollOff, 0, 1, 'rollOff');
  else if (pulse.shape !== 'rectangular') {
    throw new RadioError('missing', 'pulse', 'must be root-raised-cosine or rectangular');
  }
  return pulse;
}

/**
 * Two-sided width of the pulse's spectrum in symbol rates: 1 + roll-off.
 * A rectangular pulse has no edge; its main lobe, 2 symbol rates between the first nulls, is taken
 * (common practice).
 */
export function occupiedSymbolRates(pulse: Pulse): number {
  requirePulse(pulse);
  return pulse.shape === 'rectangular' ? 2 : 1 + pulse.rollOff;
}

/**
 * Amplitude spectrum G(f) of the unit-energy root-raised-cosine pulse, symbol rate 1.
 * G = 1 for |f| <= (1-a)/2, cos(pi (|f| - (1-a)/2) / (2a)) up to (1+a)/2, 0 beyond.
 * The integral of G^2 is 1, that of G^4 is 1 - a/4.
 * @param frequency in symbol rates
 * @param rollOff a, 0 to 1
 */
export function rootRaisedCosineSpectrum(frequency: number, rollOff: number): number {
  const beyondFlat = Math.abs(frequency) - (1 - rollOff) / 2;
  if (beyondFlat <= 0) return 1;
  if (beyondFlat >= rollOff) return 0;
  return Math.cos((Math.PI * beyondFlat) / (2 * rollOff));
}
