import { alignDecimals, formatDecimal, parseDecimal, powerOfTen, ratioToNumber } from './decimal';
import { RadioError, requireFinite, requirePositive } from './errors';

const PPM = 1_000_000n;

function readPair(frequencyHzText: string, nominalHzText: string) {
  const frequency = parseDecimal(frequencyHzText, 'frequencyHz');
  const nominal = parseDecimal(nominalHzText, 'nominalHz');
  if (frequency.units <= 0n) throw notPositive('frequencyHz');
  if (nominal.units <= 0n) throw notPositive('nominalHz');
  const { a, b } = alignDecimals(frequency, nominal);
  return { difference: a - b, nominal: b };
}

const notPositive = (argument: string) =>
  new RadioError('not_positive', argument, 'must be above zero hertz');

/**
 * Fractional frequency offset of a reading from nominal, in ppm, rounded once.
 *
 * y = (f - f_nom) / f_nom, ppm = 1e6 y. The difference and the ratio are taken in integers, so that
 * nothing is lost at 10 MHz with fifteen decimals, where a difference of doubles keeps six digits.
 *
 * @param frequencyHzText measured frequency in Hz, a decimal text
 * @param nominalHzText nominal frequency in Hz, a decimal text
 * @returns the double nearest to the exact offset in ppm
 * @throws RadioError `not_a_decimal`, `not_positive`
 * @see NIST SP 1065 (2008) section 3; IEEE Std 1139
 */
export function offsetPpm(frequencyHzText: string, nominalHzText: string): number {
  const { difference, nominal } = readPair(frequencyHzText, nominalHzText);
  return ratioToNumber(difference * PPM, nominal);
}

/** The offset in ppb, otherwise as {@link offsetPpm}. */
export function offsetPpb(frequencyHzText: string, nominalHzText: string): number {
  const { difference, nominal } = readPair(frequencyHzText, nominalHzText);
  return ratioToNumber(difference * PPM * 1000n, nominal);
}

/** The offset y itself (no unit), otherwise as {@link offsetPpm}. */
export function fractionalOffset(frequencyHzText: string, nominalHzText: string): number {
  const { difference, nominal } = readPair(frequencyHzText, nominalHzText);
  return ratioToNumber(difference, nominal);
}

/**
 * The offset in ppm as a decimal text of a fixed number of decimals, halves away from zero: the same
 * rounding as round() of a numeric in PostgreSQL, so that both sides print the same digits.
 * @param decimals 0 to 30
 * @throws RadioError `not_a_decimal`, `not_positive`, `out_of_range`
 */
export function offsetPpmText(
  frequencyHzText: string,
  nominalHzText: string,
  decimals: number,
): string {
  if (!Number.isInteger(decimals) || decimals < 0 || decimals > 30) {
    throw new RadioError('out_of_range', 'decimals', 'must be a whole number from 0 to 30');
  }
  const { difference, nominal } = readPair(frequencyHzText, nominalHzText);
  const magnitude = (difference < 0n ? -difference : difference) * PPM * powerOfTen(decimals);
  const rounded = (2n * magnitude + nominal) / (2n * nominal);
  const text = formatDecimal({ units: rounded, scale: decimals });
  const [whole = '0', fraction = ''] = text.split('.');
  const padded = decimals > 0 ? `${whole}.${fraction.padEnd(decimals, '0')}` : whole;
  return difference < 0n && rounded > 0n ? `-${padded}` : padded;
}

/** A frequency difference in Hz as ppm of a carrier: 1e6 offsetHz / carrierHz. */
export function hzToPpm(offsetHz: number, carrierHz: number): number {
  requireFinite(offsetHz, 'offsetHz');
  return (offsetHz / requirePositive(carrierHz, 'carrierHz')) * 1e6;
}

/** An offset in ppm as Hz at a carrier: offsetPpm carrierHz / 1e6. */
export function ppmToHz(offsetPpmValue: number, carrierHz: number): number {
  requireFinite(offsetPpmValue, 'offsetPpm');
  return offsetPpmValue * (requirePositive(carrierHz, 'carrierHz') / 1e6);
}
