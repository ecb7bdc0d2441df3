import { formatNumber, groupThousands, MINUS, type NumberOptions } from './number';
import { type Quantity, quantityText } from './quantity';

const STEPS = [
  { from: 1e9, unit: 'GHz' },
  { from: 1e6, unit: 'MHz' },
  { from: 1e3, unit: 'kHz' },
  { from: 1, unit: 'Hz' },
  { from: 1e-3, unit: 'mHz' },
  { from: 1e-6, unit: 'µHz' },
] as const;

/** A frequency in the unit that leaves one to three digits before the point: '10 MHz', '32.768 kHz'. */
export function hertzParts(
  valueHz: number | null | undefined,
  options: NumberOptions = {},
): Quantity {
  const significant = options.significant ?? 6;
  if (valueHz === null || valueHz === undefined || !Number.isFinite(valueHz) || valueHz === 0)
    return { number: formatNumber(valueHz, options), unit: 'Hz' };
  const rounded = Math.abs(Number(valueHz.toPrecision(significant)));
  const step = STEPS.find(({ from }) => rounded >= from) ?? STEPS[STEPS.length - 1]!;
  return {
    number: formatNumber(valueHz / step.from, { ...options, significant }),
    unit: step.unit,
  };
}

export function hertz(valueHz: number | null | undefined, options?: NumberOptions): string {
  return quantityText(hertzParts(valueHz, options));
}

/** A symbol rate: '1 Msymbol/s'. */
export function symbolRate(symbolsPerSecond: number): string {
  const { number, unit } = hertzParts(symbolsPerSecond);
  return quantityText({ number, unit: unit.replace('Hz', 'symbol/s') });
}

/** A reading digit for digit as it was written, only grouped: '10000012.20' becomes '10,000,012.20 Hz'. */
export function readingParts(decimalText: string): Quantity {
  const match = /^([+-]?)(\d+(?:\.\d+)?)$/.exec(decimalText.trim());
  if (!match) return { number: decimalText, unit: 'Hz' };
  return { number: (match[1] === '-' ? MINUS : '') + groupThousands(match[2]!), unit: 'Hz' };
}

export function reading(decimalText: string): string {
  return quantityText(readingParts(decimalText));
}
