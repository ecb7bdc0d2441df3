import { numberSigns } from './signs';

/** U+2212, as wide as the plus sign. */
export const MINUS = '\u2212';

/** U+00A0: the unit stays with its number. (The narrow U+202F is not in the typeface shipped with the product.) */
export const UNIT_SPACE = '\u00a0';

export interface NumberOptions {
  /** Exactly so many places after the decimal point. Wins over `significant`. */
  decimals?: number;
  /** So many significant digits; zeros at the end of the fraction are dropped. Default 3. */
  significant?: number;
  /** 'always' writes a plus sign before positive values, for offsets. */
  sign?: 'auto' | 'always';
}

/**
 * A number as people read it, with the signs of the person's setting (see signs.ts; a point, and commas between
 * thousands from 1,000 on, unless told otherwise) and U+2212 as minus.
 * Never minus nought, never exponents. A missing or non-finite value is an en dash.
 */
export function formatNumber(
  value: number | null | undefined,
  { decimals, significant = 3, sign = 'auto' }: NumberOptions = {},
): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return '–';
  const magnitude = Math.abs(value);
  const digits =
    decimals === undefined
      ? trimZeros(magnitude.toFixed(placesFor(magnitude, significant)))
      : magnitude.toFixed(Math.min(Math.max(decimals, 0), 20));
  const nought = !/[1-9]/.test(digits);
  const prefix = nought ? '' : value < 0 ? MINUS : sign === 'always' ? '+' : '';
  return prefix + groupThousands(digits);
}

/** Places after the point that show `significant` digits; whole digits are never rounded away. */
export function placesFor(magnitude: number, significant: number): number {
  if (magnitude === 0) return 0;
  const leading = Math.floor(Math.log10(Number(magnitude.toPrecision(significant))));
  return Math.min(Math.max(significant - 1 - leading, 0), 20);
}

/** '10000012.20' becomes '10,000,012.20'; the fraction is left as it is. */
export function groupThousands(digits: string): string {
  const { decimal, group } = numberSigns();
  const [whole = '', fraction] = digits.split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, group);
  return fraction === undefined ? grouped : grouped + decimal + fraction;
}

function trimZeros(digits: string): string {
  return digits.includes('.') ? digits.replace(/\.?0+$/, '') : digits;
}
