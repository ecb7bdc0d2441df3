import { normalUpperTail } from '../statistics/distributions/normal';
import { RadioError, requireFinite, requireNonNegative } from './errors';

export interface NormalPair {
  meanPpm: number;
  sdPpm: number;
  /** P(|a - b| > limit). */
  shareBeyond: number;
}

/**
 * Two lots with normal offsets, a unit of each: a - b ~ N(m_a - m_b, s_a^2 + s_b^2).
 * A lot screened at its limits is clipped, not normal; say so before using this for one.
 * @param limitPpm allowance for |a - b|, ppm, zero or above
 * @throws RadioError `not_finite`, `out_of_range`
 */
export function normalPair(
  a: { meanPpm: number; sdPpm: number },
  b: { meanPpm: number; sdPpm: number },
  limitPpm: number,
): NormalPair {
  requireNonNegative(limitPpm, 'limitPpm');
  const meanPpm = requireFinite(a.meanPpm, 'a.meanPpm') - requireFinite(b.meanPpm, 'b.meanPpm');
  const sdPpm = Math.hypot(
    requireNonNegative(a.sdPpm, 'a.sdPpm'),
    requireNonNegative(b.sdPpm, 'b.sdPpm'),
  );
  if (sdPpm === 0) return { meanPpm, sdPpm, shareBeyond: Math.abs(meanPpm) > limitPpm ? 1 : 0 };
  const shareBeyond =
    normalUpperTail((limitPpm - meanPpm) / sdPpm) + normalUpperTail((limitPpm + meanPpm) / sdPpm);
  return { meanPpm, sdPpm, shareBeyond };
}

export interface MeasuredPairs {
  pairs: number;
  pairsBeyond: number;
  shareBeyond: number;
  greatestAbsolutePpm: number;
  meanPpm: number;
  /** Standard deviation over all pairs (population form). */
  sdPpm: number;
}

function momentsOf(values: Float64Array) {
  let sum = 0;
  for (const value of values) sum += value;
  const mean = sum / values.length;
  let squares = 0;
  for (const value of values) squares += (value - mean) ** 2;
  return { mean, variance: squares / values.length };
}

/** The values as a Float64Array, the same one if they are one. @throws RadioError `too_few`, `not_finite` */
export function finiteOffsets(values: ArrayLike<number>, argument: string): Float64Array {
  if (values.length === 0)
    throw new RadioError('too_few', argument, 'must hold at least one offset');
  const offsets = values instanceof Float64Array ? values : Float64Array.from(values);
  // A value less itself is 0, or NaN when it is not finite: one sum tells of all.
  let check = 0;
  for (let i = 0; i < offsets.length; i += 1) check += offsets[i]! - offsets[i]!;
  requireFinite(check, argument);
  return offsets;
}

/** The values sorted; a sorted Float64Array is taken as it is. @throws RadioError `too_few`, `not_finite` */
export function sortedOffsets(values: ArrayLike<number>, argument: string): Float64Array {
  const offsets = finiteOffsets(values, argument);
  let sorted = true;
  for (let i = 1; i < offsets.length && sorted; i += 1) sorted = offsets[i - 1]! <= offsets[i]!;
  return sorted ? offsets : offsets.slice().sort();
}

/**
 * Counts the far ends of a sorted lot with |a - b| > limit, for units a that never fall from call to
 * call. Both pointers only move up, so a million by a million takes milliseconds.
 */
export function makeBeyondCounter(
  farEndsSorted: Float64Array,
  limitPpm: number,
): (unitPpm: number) => number {
  const last = farEndsSorted.length;
  let below = 0; // far ends with a - b > limit
  let notAbove = 0; // far ends with b - a <= limit
  return (a) => {
    while (below < last && a - farEndsSorted[below]! > limitPpm) below += 1;
    while (notAbove < last && !(farEndsSorted[notAbove]! - a > limitPpm)) notAbove += 1;
    return below + last - notAbove;
  };
}

/**
 * Two measured lots, every unit of one with every unit of the other (discrete convolution).
 * "Beyond" is strictly greater than the limit. Order n log n + m log m.
 * @param unitsPpm offsets of one lot, ppm, at least one
 * @param farEndsPpm offsets of the other, ppm, at least one
 * @param limitPpm allowance for |a - b|, ppm, zero or above
 * @throws RadioError `too_few`, `not_finite`, `out_of_range`
 */
export function measuredPairs(
  unitsPpm: ArrayLike<number>,
  farEndsPpm: ArrayLike<number>,
  limitPpm: number,
): MeasuredPairs {
  requireNonNegative(limitPpm, 'limitPpm');
  const a = sortedOffsets(unitsPpm, 'unitsPpm');
  const b = sortedOffsets(farEndsPpm, 'farEndsPpm');
  let pairsBeyond = 0;
  const countBeyond = makeBeyondCounter(b, limitPpm);
  for (const unit of a) pairsBeyond += countBeyond(unit);
  const ofA = momentsOf(a);
  const ofB = momentsOf(b);
  const pairs = a.length * b.length;
  return {
    pairs,
    pairsBeyond,
    shareBeyond: pairsBeyond / pairs,
    greatestAbsolutePpm: Math.max(
      Math.abs(a[a.length - 1]! - b[0]!),
      Math.abs(a[0]! - b[b.length - 1]!),
    ),
    meanPpm: ofA.mean - ofB.mean,
    sdPpm: Math.sqrt(ofA.variance + ofB.variance),
  };
}
