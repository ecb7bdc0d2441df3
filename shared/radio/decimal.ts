import { RadioError } from './errors';

/** An exact decimal number: `units` divided by ten to the power `scale`. */
export interface Decimal {
  readonly units: bigint;
  readonly scale: number;
}

const PATTERN = /^([+-]?)(\d*)(?:\.(\d*))?(?:[eE]([+-]?\d{1,3}))?$/;
/** Longer texts are no readings; the bound keeps hostile input from growing huge integers. */
const LONGEST_TEXT = 80;
const LARGEST_EXPONENT = 60;

export const powerOfTen = (exponent: number): bigint => 10n ** BigInt(exponent);

/**
 * The exact value of a decimal text such as "10000000.126856699585915" or "1.6368e7".
 * @param text sign, digits, at most one point, optional exponent from -60 to 60; no spaces, no grouping
 * @param argument name of the argument in the error
 * @throws RadioError `not_a_decimal`
 */
export function parseDecimal(text: string, argument = 'value'): Decimal {
  const match = text.length <= LONGEST_TEXT ? PATTERN.exec(text) : null;
  const [, sign = '', whole = '', fraction = '', exponentText = '0'] = match ?? [];
  const exponent = Number(exponentText);
  if (!match || whole.length + fraction.length === 0 || Math.abs(exponent) > LARGEST_EXPONENT) {
    const shown = text.length > 30 ? `${text.slice(0, 30)}…` : text;
    throw new RadioError(
      'not_a_decimal',
      argument,
      `must be a plain decimal number such as 10000000.125, not "${shown}"`,
    );
  }
  const magnitude = BigInt(whole + fraction);
  const units = sign === '-' ? -magnitude : magnitude;
  const scale = fraction.length - exponent;
  return scale >= 0 ? { units, scale } : { units: units * powerOfTen(-scale), scale: 0 };
}

/** The shortest plain decimal text of an exact decimal: no exponent, no trailing zeros. */
export function formatDecimal({ units, scale }: Decimal): string {
  const negative = units < 0n;
  const digits = (negative ? -units : units).toString().padStart(scale + 1, '0');
  const whole = digits.slice(0, digits.length - scale);
  const fraction = digits.slice(digits.length - scale).replace(/0+$/, '');
  return `${negative ? '-' : ''}${whole}${fraction ? `.${fraction}` : ''}`;
}

/** Both decimals as integers in units of ten to the minus the greater scale. */
export function alignDecimals(a: Decimal, b: Decimal): { a: bigint; b: bigint; scale: number } {
  const scale = Math.max(a.scale, b.scale);
  return {
    a: a.units * powerOfTen(scale - a.scale),
    b: b.units * powerOfTen(scale - b.scale),
    scale,
  };
}

const bitLength = (value: bigint): number => value.toString(2).length;

/**
 * The double nearest to numerator/denominator (ties to even): the quotient is taken to 66 bits with
 * a sticky last bit, so it is rounded once.
 * @param denominator above zero
 */
export function ratioToNumber(numerator: bigint, denominator: bigint): number {
  if (numerator === 0n) return 0;
  const magnitude = numerator < 0n ? -numerator : numerator;
  const shift = Math.max(0, 66 - (bitLength(magnitude) - bitLength(denominator)));
  const shifted = magnitude << BigInt(shift);
  const quotient = shifted / denominator;
  const sticky = shifted % denominator === 0n ? 0n : 1n;
  const value = Number(quotient | sticky) / 2 ** shift;
  return numerator < 0n ? -value : value;
}
