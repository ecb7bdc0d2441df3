import { normalCdf, normalDensity, normalUpperTail } from '../statistics/distributions/normal';
import { requireFinite, requireNonNegative } from './errors';
import { sortedOffsets } from './lot-pairs';

/** The other end of a link: uniform within its tolerance, normal, or another measured lot. Offsets in ppm. */
export type FarEnd =
  | { readonly model: 'uniform'; readonly tolerancePpm: number }
  | { readonly model: 'normal'; readonly meanPpm: number; readonly sdPpm: number }
  | { readonly model: 'measured'; readonly offsetsPpm: ArrayLike<number> };

/**
 * Doppler of a link. `worst-case`: every link is judged at the greatest speed, in the direction that
 * hurts. `uniform`: the shift is equally likely anywhere in +/-halfWidthPpm.
 */
export interface LinkDoppler {
  readonly model: 'worst-case' | 'uniform';
  readonly halfWidthPpm: number;
}

/** A continuous distribution of the far end's offset. */
export interface FarEndDistribution {
  cdf(xPpm: number): number;
  upperTail(xPpm: number): number;
  density(xPpm: number): number;
  /** Standard deviation-like width over which the functions bend, for interpolation; 0 where they have corners. */
  scalePpm: number;
}

/** Sum of two independent uniforms on +/-a and +/-b: a trapezoid. */
function trapezoid(a: number, b: number): FarEndDistribution {
  const wide = Math.max(a, b);
  const narrow = Math.min(a, b);
  const lowerTail = (x: number): number => {
    if (x <= -wide - narrow) return 0;
    if (x > 0) return 1 - lowerTail(-x);
    const ramp = x + wide + narrow;
    return ramp < 2 * narrow ? ramp ** 2 / (8 * wide * narrow) : (x + wide) / (2 * wide);
  };
  const density = (x: number) => {
    const reach = wide + narrow - Math.abs(x);
    if (reach <= 0) return 0;
    return reach < 2 * narrow ? reach / (4 * wide * narrow) : 1 / (2 * wide);
  };
  return { cdf: lowerTail, upperTail: (x) => lowerTail(-x), density, scalePpm: 0 };
}

/** Normal plus an independent uniform on +/-d: the mean of the normal's cdf over the uniform. */
function smearedNormal(mean: number, sd: number, d: number): FarEndDistribution {
  const ratio = d / sd;
  // Integral of the upper tail from z to infinity.
  const beyond = (z: number) => normalDensity(z) - z * normalUpperTail(z);
  const standardUpper = (z: number) => {
    // Narrow smear: the closed form would cancel, two terms of its series are exact to rounding.
    if (ratio < 1e-3) return normalUpperTail(z) + (ratio ** 2 / 6) * z * normalDensity(z);
    if (z < 0) return 1 - (beyond(-z - ratio) - beyond(-z + ratio)) / (2 * ratio);
    return (beyond(z - ratio) - beyond(z + ratio)) / (2 * ratio);
  };
  const density = (x: number) => {
    const z = (x - mean) / sd;
    if (ratio < 1e-3) return normalDensity(z) / sd;
    return (normalCdf(z + ratio) - normalCdf(z - ratio)) / (2 * d);
  };
  return {
    cdf: (x) => standardUpper((mean - x) / sd),
    upperTail: (x) => standardUpper((x - mean) / sd),
    density,
    scalePpm: sd,
  };
}

/**
 * The distribution of a far end that is not a measured lot, smeared by uniform Doppler.
 * @throws RadioError `not_finite`, `out_of_range`
 */
export function farEndDistribution(
  farEnd: Exclude<FarEnd, { model: 'measured' }>,
  uniformDopplerPpm: number,
): FarEndDistribution | { fixedPpm: number } {
  if (farEnd.model === 'uniform') {
    const tolerance = requireNonNegative(farEnd.tolerancePpm, 'farEnd.tolerancePpm');
    if (tolerance === 0 && uniformDopplerPpm === 0) return { fixedPpm: 0 };
    return trapezoid(tolerance, uniformDopplerPpm);
  }
  const mean = requireFinite(farEnd.meanPpm, 'farEnd.meanPpm');
  const sd = requireNonNegative(farEnd.sdPpm, 'farEnd.sdPpm');
  if (sd > 0) return smearedNormal(mean, sd, uniformDopplerPpm);
  if (uniformDopplerPpm === 0) return { fixedPpm: mean };
  const around = trapezoid(uniformDopplerPpm, 0);
  return {
    cdf: (x) => around.cdf(x - mean),
    upperTail: (x) => around.upperTail(x - mean),
    density: (x) => around.density(x - mean),
    scalePpm: 0,
  };
}

export const measuredFarEnd = (farEnd: Extract<FarEnd, { model: 'measured' }>): Float64Array =>
  sortedOffsets(farEnd.offsetsPpm, 'farEnd.offsetsPpm');
