import {
  type FarEnd,
  type FarEndDistribution,
  farEndDistribution,
  measuredFarEnd,
} from './far-end';
import { countBeyondPerUnit } from './lot-pairs';

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

function tabulatedShares(
  units: Float64Array,
  far: FarEndDistribution,
  limit: number,
): Float64Array | null {
  const low = units[0]!;
  const step = far.scalePpm / PIECES_PER_SCALE;
  const pieces = Math.ceil((units[units.length - 1]! - low) / step) + 1;
  if (!(far.scalePpm > 0) || units.length < TABULATE_FROM || pieces > units.length / 4) return null;
  const share = new Float64Array(pieces + 1);
  const slope = new Float64Array(pieces + 1);
  for (let i = 0; i <= pieces; i += 1) {
    const u = low + i * step;
    share[i] = far.cdf(u - limit) + far.upperTail(u + limit);
    slope[i] = (far.density(u - limit) - far.density(u + limit)) * step;
  }
  return units.map((u) => {
    const at = (u - low) / step;
    const i = Math.floor(at);
    const t = at - i;
    const s = 1 - t;
    const left = share[i]! * (1 + 2 * t) + slope[i]! * t;
    const right = share[i + 1]! * (1 + 2 * s) - slope[i + 1]! * s;
    return clampShare(left * s * s + right * t * t);
  });
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
 * Per-unit shares beyond a limit for a sorted lot.
 * @param units offsets of the units, ppm, sorted
 * @param uniformDopplerPpm half-width of a Doppler shift spread evenly; 0 for none
 */
export function sharesBeyond(
  units: Float64Array,
  farEnd: FarEnd,
  uniformDopplerPpm: number,
): SharesBeyond {
  const everything = () => new Float64Array(units.length).fill(1);
  if (farEnd.model === 'measured') {
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
  const far = farEndDistribution(farEnd, uniformDopplerPpm);
  return (limit) => {
    if (limit < 0) return everything();
    if ('fixedPpm' in far) return units.map((u) => (Math.abs(u - far.fixedPpm) > limit ? 1 : 0));
    return tabulatedShares(units, far, limit) ?? directShares(units, far, limit);
  };
}
