import {
  type FarEnd,
  type FarEndDistribution,
  farEndDistribution,
  measuredFarEnd,
} from './far-end';
import { finiteOffsets, makeBeyondCounter, sortedOffsets } from './lot-pairs';

/**
 * Writes the shares of units[start, end) into into[0, end - start). Called for one stretch after the
 * other from the first unit on, so that a lot of a million needs no array of its own for them.
 */
export type ShareWriter = (start: number, end: number, into: Float64Array) => void;

export interface SharesBeyond {
  units: number;
  /** For each unit the probability, over far ends and Doppler, that |unit - far end + Doppler| > limit. */
  writer(limitPpm: number): ShareWriter;
}

const clampShare = (share: number): number => Math.min(1, Math.max(0, share));

const always: ShareWriter = (start, end, into) => void into.fill(1, 0, end - start);

/** Above this many units a smooth share is tabulated and interpolated. */
const TABULATE_FROM = 20_000;
/** Cubic Hermite pieces of sd/128 err by less than 2e-11. */
const PIECES_PER_SCALE = 128;

const eachUnit =
  (units: Float64Array, shareOf: (offsetPpm: number) => number): ShareWriter =>
  (start, end, into) => {
    for (let i = start; i < end; i += 1) into[i - start] = clampShare(shareOf(units[i]!));
  };

/** A far end anywhere in +/-tolerance: two straight ramps, no function call per unit. */
function uniformWriter(units: Float64Array, tolerance: number, limit: number): ShareWriter {
  const clear = limit - tolerance;
  const width = 2 * tolerance;
  return (start, end, into) => {
    for (let i = start; i < end; i += 1) {
      const reach = Math.abs(units[i]!);
      const near = reach > clear ? Math.min(reach - clear, width) : 0;
      const far = -reach > clear ? Math.min(-reach - clear, width) : 0;
      const over = near + far;
      into[i - start] = over >= width ? 1 : over / width;
    }
  };
}

function rangeOf(values: Float64Array): { low: number; high: number } {
  let low = Infinity;
  let high = -Infinity;
  for (let i = 0; i < values.length; i += 1) {
    const value = values[i]!;
    if (value < low) low = value;
    if (value > high) high = value;
  }
  return { low, high };
}

function smoothWriter(units: Float64Array, far: FarEndDistribution, limit: number): ShareWriter {
  const exact = (u: number) => far.cdf(u - limit) + far.upperTail(u + limit);
  if (!(far.scalePpm > 0) || units.length < TABULATE_FROM) return eachUnit(units, exact);
  const { low, high } = rangeOf(units);
  const step = far.scalePpm / PIECES_PER_SCALE;
  const pieces = Math.ceil((high - low) / step) + 1;
  if (pieces > units.length / 4) return eachUnit(units, exact);

  const share = new Float64Array(pieces + 1);
  const slope = new Float64Array(pieces + 1);
  for (let i = 0; i <= pieces; i += 1) {
    const u = low + i * step;
    share[i] = exact(u);
    slope[i] = (far.density(u - limit) - far.density(u + limit)) * step;
  }
  return eachUnit(units, (u) => {
    const at = (u - low) / step;
    const i = Math.floor(at);
    const t = at - i;
    const s = 1 - t;
    const left = share[i]! * (1 + 2 * t) + slope[i]! * t;
    const right = share[i + 1]! * (1 + 2 * s) - slope[i + 1]! * s;
    return left * s * s + right * t * t;
  });
}

/**
 * Measured far ends with uniform Doppler: each far end's step becomes a ramp of width 2 d,
 * summed by prefix sums between two pointers that only move up.
 */
function rampedWriter(
  units: Float64Array,
  farEnds: Float64Array,
  limit: number,
  d: number,
): ShareWriter {
  const count = farEnds.length;
  const prefix = new Float64Array(count + 1);
  for (let i = 0; i < count; i += 1) prefix[i + 1] = prefix[i]! + farEnds[i]!;
  // Sum over far ends b of P(b + uniform < x), for x that never falls.
  const makeBelow = () => {
    let certain = 0;
    let possible = 0;
    return (x: number) => {
      while (certain < count && farEnds[certain]! <= x - d) certain += 1;
      while (possible < count && farEnds[possible]! < x + d) possible += 1;
      const ramping = possible - certain;
      const ramp = ramping * (x + d) - (prefix[possible]! - prefix[certain]!);
      return certain + ramp / (2 * d);
    };
  };
  const belowLow = makeBelow();
  const belowHigh = makeBelow();
  return eachUnit(units, (u) => (belowLow(u - limit) + count - belowHigh(u + limit)) / count);
}

/**
 * Per-unit shares of links beyond a limit.
 * @param unitsPpm offsets of the units, ppm, any order; sorted first where the far end is a measured lot
 * @param uniformDopplerPpm half-width of a Doppler shift spread evenly; 0 for none
 * @throws RadioError `too_few`, `not_finite`, `out_of_range`
 */
export function sharesBeyond(
  unitsPpm: ArrayLike<number>,
  farEnd: FarEnd,
  uniformDopplerPpm: number,
): SharesBeyond {
  if (farEnd.model === 'measured') {
    const units = sortedOffsets(unitsPpm, 'unitsPpm');
    const farEnds = measuredFarEnd(farEnd);
    const writer = (limit: number): ShareWriter => {
      if (limit < 0) return always;
      if (uniformDopplerPpm > 0) return rampedWriter(units, farEnds, limit, uniformDopplerPpm);
      const countBeyond = makeBeyondCounter(farEnds, limit);
      return eachUnit(units, (u) => countBeyond(u) / farEnds.length);
    };
    return { units: units.length, writer };
  }
  const units = finiteOffsets(unitsPpm, 'unitsPpm');
  const far = farEndDistribution(farEnd, uniformDopplerPpm);
  const writer = (limit: number): ShareWriter => {
    if (limit < 0) return always;
    if ('fixedPpm' in far) {
      return eachUnit(units, (u) => (Math.abs(u - far.fixedPpm) > limit ? 1 : 0));
    }
    return farEnd.model === 'uniform' && uniformDopplerPpm === 0
      ? uniformWriter(units, farEnd.tolerancePpm, limit)
      : smoothWriter(units, far, limit);
  };
  return { units: units.length, writer };
}
