import { requireFinite, requireNonNegative, requirePositive, requireWithin } from './errors';

/** Speed of light in vacuum in m/s, exact by the definition of the metre. */
export const SPEED_OF_LIGHT_MPS = 299_792_458;

export interface DopplerShift {
  /** f v / c, Hz. */
  firstOrderHz: number;
  /** f (sqrt((1+b)/(1-b)) - 1) with b = v/c, radial motion, Hz. */
  relativisticHz: number;
  /** relativistic minus first order, about f b^2 / 2, Hz. */
  differenceHz: number;
}

/**
 * Doppler shift of a carrier for radial motion.
 *
 * With s = sqrt(1 - b^2), sqrt((1+b)/(1-b)) - 1 - b = (1+b) b^2 / (s (1+s)): no term cancels, so the
 * difference keeps all its digits at walking speed too.
 *
 * @param carrierHz carrier in Hz, above zero
 * @param closingSpeedMps speed in m/s, positive when the ends approach, below that of light
 * @throws RadioError `not_finite`, `not_positive`, `out_of_range`
 * @see closed form of special relativity; c from the definition of the metre
 */
export function dopplerShift(carrierHz: number, closingSpeedMps: number): DopplerShift {
  requirePositive(carrierHz, 'carrierHz');
  requireFinite(closingSpeedMps, 'closingSpeedMps');
  const b = closingSpeedMps / SPEED_OF_LIGHT_MPS;
  requireWithin(Math.abs(b), 0, 1 - Number.EPSILON, 'closingSpeedMps over the speed of light');
  const s = Math.sqrt((1 - b) * (1 + b));
  const firstOrderHz = carrierHz * b;
  const differenceHz = (carrierHz * (1 + b) * b * b) / (s * (1 + s));
  return { firstOrderHz, relativisticHz: firstOrderHz + differenceHz, differenceHz };
}

/**
 * Largest Doppler offset in ppm at a speed, either direction: 1e6 times the relativistic closing shift.
 * @param greatestSpeedMps relative speed in m/s, zero or above
 */
export function dopplerPpm(greatestSpeedMps: number): number {
  requireNonNegative(greatestSpeedMps, 'greatestSpeedMps');
  return dopplerShift(1e6, greatestSpeedMps).relativisticHz;
}
