import { parseDecimal, powerOfTen, ratioToNumber } from './decimal';
import { RadioError } from './errors';
import { offsetPpm } from './offset';

/** Offsets in ppm from one nominal frequency, for readings by the million. */
export interface OffsetReader {
  /** Offset of a decimal text in Hz. @throws RadioError `not_a_decimal`, `not_positive` */
  ofText(frequencyHzText: string): number;
  /** Offset of the ASCII decimal in bytes[start, end). @throws as ofText */
  ofBytes(bytes: Uint8Array, start?: number, end?: number): number;
  /** Offset of a double in Hz; digits the double never held cannot return. @throws RadioError `not_finite`, `not_positive` */
  ofNumber(frequencyHz: number): number;
  /** Offsets of many doubles, written to `into` (made when absent, may be the input). */
  ofNumbers(frequencyHz: Float64Array, into?: Float64Array): Float64Array;
}

/** Up to this many digits an integer is held exactly by a double. */
const EXACT_DIGITS = 15;
const ZERO = 48;
const POINT = 46;

const greatestCommonDivisor = (a: bigint, b: bigint): bigint =>
  b === 0n ? a : greatestCommonDivisor(b, a % b);

/**
 * A reader of offsets in ppm against one nominal frequency.
 *
 * The whole and the decimal part of a reading are read as two integers of at most fifteen digits,
 * each exact in a double, and the nominal's parts are subtracted before the two are joined:
 * with |whole difference| <= 1 the joined difference is exact, and with 2 or more it cannot cancel.
 * Results agree with {@link offsetPpm} within 4 units in the last place; other writings (exponent,
 * sign, more digits) take the exact path.
 *
 * @param nominalHzText nominal frequency in Hz, a decimal text
 * @throws RadioError `not_a_decimal`, `not_positive`
 */
export function makeOffsetPpm(nominalHzText: string): OffsetReader {
  const nominal = parseDecimal(nominalHzText, 'nominalHz');
  if (nominal.units <= 0n) {
    throw new RadioError('not_positive', 'nominalHz', 'must be above zero hertz');
  }
  const unit = powerOfTen(nominal.scale);
  const nominalWhole = Number(nominal.units / unit);
  const fastPossible = nominal.scale <= EXACT_DIGITS && nominalWhole < 10 ** EXACT_DIGITS;

  const tenTo: number[] = [];
  const nominalFraction: number[] = [];
  const multiplier: number[] = [];
  const divisor: number[] = [];
  for (let decimals = 0; decimals <= EXACT_DIGITS; decimals += 1) {
    tenTo.push(10 ** decimals);
    const shift = decimals - nominal.scale;
    nominalFraction.push(shift < 0 ? NaN : Number((nominal.units % unit) * powerOfTen(shift)));
    // 1e6 over the nominal in lowest terms: small whole numbers, which doubles hold exactly.
    const scaled = shift < 0 ? 1n : nominal.units * powerOfTen(shift);
    const common = greatestCommonDivisor(1_000_000n, scaled);
    multiplier.push(Number(1_000_000n / common));
    divisor.push(Number(scaled / common));
  }

  /** NaN when the writing is not the plain one. */
  function fast(bytes: Uint8Array, start: number, end: number): number {
    let whole = 0;
    let index = start;
    for (; index < end; index += 1) {
      const digit = bytes[index]! - ZERO;
      if (digit < 0 || digit > 9) break;
      whole = whole * 10 + digit;
    }
    const wholeDigits = index - start;
    if (wholeDigits === 0 || wholeDigits > EXACT_DIGITS) return NaN;
    let fraction = 0;
    let decimals = 0;
    if (index < end) {
      if (bytes[index]! !== POINT) return NaN;
      decimals = end - index - 1;
      if (decimals > EXACT_DIGITS) return NaN;
      for (index += 1; index < end; index += 1) {
        const digit = bytes[index]! - ZERO;
        if (digit < 0 || digit > 9) return NaN;
        fraction = fraction * 10 + digit;
      }
    }
    if (whole === 0 && fraction === 0) return NaN;
    if (decimals < nominal.scale) {
      fraction *= tenTo[nominal.scale - decimals]!;
      decimals = nominal.scale;
    }
    const difference =
      (whole - nominalWhole) * tenTo[decimals]! + (fraction - nominalFraction[decimals]!);
    return (difference * multiplier[decimals]!) / divisor[decimals]!;
  }

  // One loop reads bytes only: a second kind of source would slow it down threefold.
  const scratch = new Uint8Array(2 * EXACT_DIGITS + 1);

  function ofText(text: string): number {
    if (!fastPossible || text.length > scratch.length) return offsetPpm(text, nominalHzText);
    for (let i = 0; i < text.length; i += 1) {
      const code = text.charCodeAt(i);
      // A byte keeps the low half of a letter only, which may look like a digit.
      scratch[i] = code < 128 ? code : 0;
    }
    const value = fast(scratch, 0, text.length);
    return Number.isNaN(value) ? offsetPpm(text, nominalHzText) : value;
  }

  function ofBytes(bytes: Uint8Array, start = 0, end = bytes.length): number {
    const value = fastPossible ? fast(bytes, start, end) : NaN;
    if (!Number.isNaN(value)) return value;
    const text = String.fromCharCode(...bytes.subarray(start, Math.min(end, start + 100)));
    return offsetPpm(text, nominalHzText);
  }

  // What the nearest double leaves of the nominal, so that a nominal with decimals costs nothing.
  const nominalHigh = ratioToNumber(nominal.units, unit);
  const binary = 2n ** 80n;
  const highUnits = BigInt(nominalHigh * 2 ** 80);
  const nominalLow = ratioToNumber(nominal.units * binary - highUnits * unit, unit * binary);
  const perPpm = ratioToNumber(nominal.units, unit * 1_000_000n);

  function ofNumber(frequencyHz: number): number {
    if (!(frequencyHz > 0 && frequencyHz < Infinity)) {
      throw new RadioError(
        Number.isFinite(frequencyHz) ? 'not_positive' : 'not_finite',
        'frequencyHz',
        'must be a finite frequency above zero hertz',
      );
    }
    return (frequencyHz - nominalHigh - nominalLow) / perPpm;
  }

  function ofNumbers(frequencyHz: Float64Array, into = new Float64Array(frequencyHz.length)) {
    for (let i = 0; i < frequencyHz.length; i += 1) into[i] = ofNumber(frequencyHz[i]!);
    return into;
  }

  return { ofText, ofBytes, ofNumber, ofNumbers };
}
