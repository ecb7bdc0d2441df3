import { formatNumber } from './number';
import { type Quantity, quantityText } from './quantity';

const STEPS: [number, string][] = [
  [1e9, 'GB'],
  [1e6, 'MB'],
  [1e3, 'kB'],
];

/** The size of a file in decimal units (IEC 80000-13): 'B' up to 999, then three digits in kB, MB or GB. */
export function bytesParts(bytes: number): Quantity {
  for (const [size, unit] of STEPS) {
    // From half a step below, so that 999 999 B is 1 MB and not 1,000 kB.
    if (bytes >= size * 0.9995)
      return { number: formatNumber(bytes / size, { significant: 3 }), unit };
  }
  return { number: formatNumber(bytes, { decimals: 0 }), unit: 'B' };
}

export function byteText(bytes: number): string {
  return quantityText(bytesParts(bytes));
}
