import { count, countOf } from '../format/counts';
import { formatNumber, placesFor } from '../format/number';
import { beyondLimits, ppm as ppmText } from '../format/ppm';
import { splitBySide } from './beyond';
import { type BandStripWords } from './shapes';
import { type BandStripFeature, type BandStripInput } from './types';

/** Axis values and words of the drawing. */
export const bandStripWords: BandStripWords = {
  allowance: 'receiver allowance',
  empty: 'no units measured yet',
  ppm: (value) => formatNumber(value, { sign: 'always' }),
  ppmWithUnit: (value) => ppmText(value, { sign: 'always' }),
  more: (value) => `+${count(value)}`,
};

/** The band strip in words, for whoever cannot see it: "200 units, mean +1.8 ppm, spread 2.1 ppm, 3 beyond +10 ppm". */
export function bandStripSentence(input: BandStripInput): string {
  if (input.unitsCount === 0) return 'No units measured yet.';
  const decimals = decimalsFor(input);
  const parts = [countOf(input.unitsCount, 'unit')];
  if (input.unitsCount === 1 && input.meanPpm !== null) {
    parts[0] += ` at ${ppmText(input.meanPpm, { decimals, sign: 'always' })}`;
  } else {
    if (input.meanPpm !== null)
      parts.push(`mean ${ppmText(input.meanPpm, { decimals, sign: 'always' })}`);
    if (input.sdPpm !== null) parts.push(`spread ${ppmText(input.sdPpm, { decimals })}`);
  }
  parts.push(...beyondParts(input));
  return parts.join(', ');
}

function beyondParts(input: BandStripInput): string[] {
  const { lowLimitPpm: lowPpm, highLimitPpm: highPpm, beyondCount, beyondPpm } = input;
  if (lowPpm === null && highPpm === null) return [];
  if (beyondCount === 0) return [`none ${beyondLimits({ lowPpm, highPpm })}`];
  if (beyondPpm.length < beyondCount)
    return [`${count(beyondCount)} ${beyondLimits({ lowPpm, highPpm })}`];
  const { low, high } = splitBySide(input);
  const limit = (value: number | null) => ppmText(value, { significant: 6, sign: 'always' });
  const parts: string[] = [];
  if (low.length > 0) parts.push(`${count(low.length)} beyond ${limit(lowPpm)}`);
  if (high.length > 0) parts.push(`${count(high.length)} beyond ${limit(highPpm)}`);
  return parts;
}

/** One thing on the strip in words, for reading it with the arrow keys. */
export function bandStripFeatureText({ kind, ppm, side }: BandStripFeature): string {
  const value = ppmText(ppm, { significant: 4, sign: 'always' });
  if (kind === 'mean') return `mean ${value}`;
  if (kind === 'beyond') return `unit beyond, ${value}`;
  const end = side === 'low' ? 'lower' : 'upper';
  return kind === 'limit'
    ? `${end} limit ${value}`
    : `${end} end of the receiver allowance ${value}`;
}

/** Two significant digits of the spread decide how many places the mean deserves. */
function decimalsFor({ meanPpm, sdPpm }: BandStripInput): number {
  const measure = sdPpm !== null && sdPpm > 0 ? sdPpm : Math.abs(meanPpm ?? 0);
  return Math.min(6, placesFor(measure, 2));
}
