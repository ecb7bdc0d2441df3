import { formatNumber, placesFor } from './number';
import { type Quantity, quantityText } from './quantity';

export interface StatedUncertainty {
  value: number;
  /** Expanded uncertainty U, in the unit of the value. */
  expanded: number;
  coverageFactor: number;
}

/**
 * A value with its expanded uncertainty, both to the same place; U keeps two significant digits.
 * Source: JCGM 100:2008, 7.2.6 (from memory).
 */
export function uncertaintyParts({ value, expanded }: StatedUncertainty, unit: string): Quantity {
  const decimals = placesFor(Math.abs(expanded), 2);
  return {
    number: `${formatNumber(value, { decimals, sign: 'always' })} ± ${formatNumber(expanded, { decimals })}`,
    unit,
  };
}

/** '+1.88 ± 0.12 ppm (k = 2)' */
export function withUncertainty(stated: StatedUncertainty, unit: string): string {
  const factor = formatNumber(stated.coverageFactor, { significant: 3 });
  return `${quantityText(uncertaintyParts(stated, unit))} (k = ${factor})`;
}

/** U alone, two significant digits with their zeros: '1.0 ppm'. */
export function expandedParts(expanded: number, unit: string): Quantity {
  return { number: formatNumber(expanded, { decimals: placesFor(Math.abs(expanded), 2) }), unit };
}

export function expandedUncertainty(expanded: number, unit: string): string {
  return quantityText(expandedParts(expanded, unit));
}
