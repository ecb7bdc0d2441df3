import { dopplerShift } from './doppler';
import { requireFinite, requirePositive } from './errors';

export interface CarrierOffset {
  /** Received carrier minus the receiver's own, Hz. */
  offsetHz: number;
  absoluteOffsetHz: number;
  /** Transmitter minus receiver, without motion, ppm. */
  relativePpm: number;
}

/**
 * Carrier frequency offset seen by a receiver.
 *
 * offset = f_c (y_a - y_b) + f_c (D - 1), D the Doppler factor. The cross term f_c y_a (D - 1) is
 * smaller than the Doppler shift by the factor |y_a| (1e-5 at 10 ppm) and is dropped.
 * Every frequency derived from one reference carries the same y.
 *
 * @param carrierHz carrier in Hz
 * @param transmitterPpm offset of the transmitter's reference, ppm
 * @param receiverPpm offset of the receiver's reference, ppm
 * @param closingSpeedMps positive when the ends approach, m/s
 * @throws RadioError `not_finite`, `not_positive`, `out_of_range`
 */
export function carrierOffset(
  carrierHz: number,
  transmitterPpm: number,
  receiverPpm: number,
  closingSpeedMps = 0,
): CarrierOffset {
  requirePositive(carrierHz, 'carrierHz');
  const relativePpm =
    requireFinite(transmitterPpm, 'transmitterPpm') - requireFinite(receiverPpm, 'receiverPpm');
  const offsetHz =
    (carrierHz / 1e6) * relativePpm + dopplerShift(carrierHz, closingSpeedMps).relativisticHz;
  return { offsetHz, absoluteOffsetHz: Math.abs(offsetHz), relativePpm };
}

/**
 * Symbols by which the receiver's symbol clock slips over a block: N (y_a - y_b).
 * Holds where the symbol clock comes from the same reference as the carrier.
 * @param blockSymbols length of the block in symbols
 * @param relativePpm transmitter minus receiver, ppm
 */
export function timingSlipSymbols(blockSymbols: number, relativePpm: number): number {
  return (
    requirePositive(blockSymbols, 'blockSymbols') * requireFinite(relativePpm, 'relativePpm') * 1e-6
  );
}
