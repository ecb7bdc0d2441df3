import { formatDecimal, parseDecimal, type Decimal } from './decimal';

/** Units in which a reading may be written: of frequency, or of offset from nominal. */
export type FrequencyUnit = 'Hz' | 'kHz' | 'MHz' | 'GHz';
export type OffsetUnit = 'ppm' | 'ppb';
export type ReadingUnit = FrequencyUnit | OffsetUnit;

const FREQUENCY_POWER: Record<FrequencyUnit, number> = { Hz: 0, kHz: 3, MHz: 6, GHz: 9 };
const OFFSET_POWER: Record<OffsetUnit, number> = { ppm: 6, ppb: 9 };

const shiftPoint = ({ units, scale }: Decimal, places: number): Decimal =>
  scale >= places
    ? { units, scale: scale - places }
    : { units: units * 10n ** BigInt(places - scale), scale: 0 };

const isFrequencyUnit = (unit: ReadingUnit): unit is FrequencyUnit => unit in FREQUENCY_POWER;

/**
 * A reading as an exact decimal text in Hz: the point moves, no digit is lost.
 * An offset v in ppm becomes nominal (1 + v / 10^6), in ppb nominal (1 + v / 10^9); both are finite decimals.
 * @param text decimal text in `unit`
 * @param nominalHzText nominal frequency in Hz, used for ppm and ppb
 * @throws RadioError `not_a_decimal`
 */
export function toHzText(text: string, unit: ReadingUnit, nominalHzText: string): string {
  const value = parseDecimal(text, 'reading');
  if (isFrequencyUnit(unit)) return formatDecimal(shiftPoint(value, FREQUENCY_POWER[unit]));
  const nominal = parseDecimal(nominalHzText, 'nominalHz');
  const scale = value.scale + OFFSET_POWER[unit];
  const onePlusOffset = 10n ** BigInt(scale) + value.units;
  return formatDecimal({ units: nominal.units * onePlusOffset, scale: nominal.scale + scale });
}

/**
 * A frequency in Hz as an exact decimal text in another unit of frequency.
 * @throws RadioError `not_a_decimal`
 */
export function fromHzText(hzText: string, unit: FrequencyUnit): string {
  const { units, scale } = parseDecimal(hzText, 'frequencyHz');
  return formatDecimal({ units, scale: scale + FREQUENCY_POWER[unit] });
}
