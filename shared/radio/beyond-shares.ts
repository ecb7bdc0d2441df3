import {
  type FarEnd,
  type FarEndDistribution,
  farEndDistribution,
  measuredFarEnd,
} from './far-end';
import { countBeyondPerUnit, finiteOffsets, sortedOffsets } from './lot-pairs';

/** For each unit the probability, over far ends and Doppler, that |unit - far end + Doppler| > limit. */
export type SharesBeyond = (limitPpm: number) => Float64Array;

const clampShare = (share: number): number => Math.min(1, Math.max(0, share));

/** Above this many units a smooth share is tabulated and interpolated. */
const TABULATE_FROM = 20_000;
/** Cubic Hermite pieces of sd/128 err by less than 2e-11. */
const PIECES_PER_SCALE = 128;

function directShares(units: Float64Array, far: FarEndDistribution, limit: number): Float64Array {
  return units.map((u) => clampShare(far.cdf(u - limit) + far.upperTail(u + limit)));
}

/** A far end anywhere in +/-tolerance: two straight ramps, no function call per unit. */
function uniformShares(units: Float64Array, tolerance: number, limit: number): Float64Array {
  const shares = new Float64Array(units.length);
  const clear = limit - tolerance;
  const width = 2 * tolerance;
  for (let i = 0; i < units.length; i += 1) {
    // Nearest to nominal first: most units of a lot are clear of both ramps.
    const reach = Math.abs(units[i]!);
    if (reach <= clear) continue;
    const over = Math.min(reach - clear, width) + Math.max(0, Math.min(-reach - clear, width));
    shares[i] = over >= width ? 1 : over / width;
  }
  return shares;
}

function tabulatedShares(
  units: Float64Array,
  far: FarEndDistribution,
  limit: number,
): Float64Array | null {
  if (!(far.scalePpm > 0) || units.length < TABULATE_FROM) return null;
  const { low, high } = rangeOf(units);
  const step = far.scalePpm / PIECES_PER_SCALE;
  const pieces = Math.ceil((high - low) / step) + 1;
  if (pieces > units.length / 4) return null;
  const share = new Float64Array(pieces + 1);
  const slope = new Float64Array(pieces + 1);
  for (let i = 0; i <= pieces; i += 1) {
    const u = low + i * step;
    share[i] = far.cdf(u - limit) + far.upperTail(u + limit);
    slope[i] = (far.density(u - limit) - far.density(u + limit)) * step;
  }
  const shares = new Float64Array(units.length);
  for (let k = 0; k < units.length; k += 1) {
    const at = (units[k]! - low) / step;
    const i = Math.floor(at);
    const t = at - i;
    const s = 1 - t;
    const left = share[i]! * (1 + 2 * t) + slope[i]! * t;
    const right = share[i + 1]! * (1 + 2 * s) - slope[i + 1]! * s;
    shares[k] = clampShare(left * s * s + right * t * t);
  }
  return shares;
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

/**
 * Measured far ends with uniform Doppler: each far end's step becomes a ramp of width 2 d,
 * summed by prefix sums between two pointers that only move up.
 */
function rampedShares(
  units: Float64Array,
  farEnds: Float64Array,
  limit: number,
  d: number,
): Float64Array {
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
  return units.map((u) => clampShare((belowLow(u - limit) + count - belowHigh(u + limit)) / count));
}

/**
 * Per-unit shares beyond a limit.
 * @param unitsPpm offsets of the units, ppm, any order; sorted first where the far end is a measured lot
 * @param uniformDopplerPpm half-width of a Doppler shift spread evenly; 0 for none
 */
export function sharesBeyond(
  unitsPpm: ArrayLike<number>,
  farEnd: FarEnd,
  uniformDopplerPpm: number,
): SharesBeyond {
  const everything = () => new Float64Array(unitsPpm.length).fill(1);
  if (farEnd.model === 'measured') {
    const units = sortedOffsets(unitsPpm, 'unitsPpm');
    const farEnds = measuredFarEnd(farEnd);
    return (limit) => {
      if (limit < 0) return everything();
      if (uniformDopplerPpm > 0) return rampedShares(units, farEnds, limit, uniformDopplerPpm);
      const shares = new Float64Array(units.length);
      countBeyondPerUnit(units, farEnds, limit, (unit, beyond) => {
        shares[unit] = beyond / farEnds.length;
      });
      return shares;
    };
  }
  const units = finiteOffsets(unitsPpm, 'unitsPpm');
  const far = farEndDistribution(farEnd, uniformDopplerPpm);
  return (limit) => {
    if (limit < 0) return everything();
    if ('fixedPpm' in far) return units.map((u) => (Math.abs(u - far.fixedPpm) > limit ? 1 : 0));
    if (farEnd.model === 'uniform' && uniformDopplerPpm === 0) {
      return uniformShares(units, farEnd.tolerancePpm, limit);
    }
    return tabulatedShares(units, far, limit) ?? directShares(units, far, limit);
  };
}
