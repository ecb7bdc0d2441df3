import { parseDecimal } from './decimal';
import { makeOffsetPpm } from './offset-reader';
import { fromHzText, type ReadingUnit } from './units';

const PER_UNIT = { ppm: 1, ppb: 1000 } as const;

/**
 * A function from a reading's text, in the unit in which it was written, to its offset in ppm.
 *
 * A ratio has no unit: readings in MHz are taken against the nominal in MHz, on the quick path of
 * makeOffsetPpm. Readings in ppm or ppb are offsets already.
 *
 * @param unit unit of every reading
 * @param nominalHzText nominal frequency in Hz, a decimal text
 * @throws RadioError `not_a_decimal`, `not_positive`, from here or from the function returned
 */
export function makeReadingToPpm(
  unit: ReadingUnit,
  nominalHzText: string,
): (text: string) => number {
  if (unit === 'ppm' || unit === 'ppb') {
    makeOffsetPpm(nominalHzText);
    return (text) => {
      parseDecimal(text, 'reading');
      return Number(text) / PER_UNIT[unit];
    };
  }
  return makeOffsetPpm(fromHzText(nominalHzText, unit)).ofText;
}
