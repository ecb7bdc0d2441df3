import { requireFinite, requireRange, requireSeries } from './errors';
import { leastSquares } from './least-squares';

/** Usual reference temperature, 25 degrees Celsius (common practice). */
export const REFERENCE_TEMPERATURE_C = 25;

/** offset(T) = offset0 + a1 (T-T0) + a2 (T-T0)^2 + a3 (T-T0)^3, ppm. */
export interface TemperatureCubic {
  readonly referenceC: number;
  /** Offset at the reference temperature, ppm. */
  readonly offsetPpm: number;
  readonly a1PpmPerK: number;
  readonly a2PpmPerK2: number;
  readonly a3PpmPerK3: number;
}

export interface CubicFit extends TemperatureCubic {
  residualsPpm: number[];
  leverages: number[];
  /** With n - 4 degrees of freedom; null with four readings. */
  residualSdPpm: number | null;
}

/** Offset of the curve at a temperature, ppm. */
export function cubicOffsetPpm(curve: TemperatureCubic, temperatureC: number): number {
  const t = requireFinite(temperatureC, 'temperatureC') - curve.referenceC;
  return curve.offsetPpm + t * (curve.a1PpmPerK + t * (curve.a2PpmPerK2 + t * curve.a3PpmPerK3));
}

/**
 * Least-squares cubic through one unit's chamber readings.
 * The polynomial is fitted in (T - T_mid)/half-range, where its columns are well apart, and then
 * written about the reference temperature.
 * @param temperaturesC at least four different temperatures
 * @param offsetsPpm one per temperature
 * @throws ResonatorError `too_few`, `lengths_differ`, `not_finite`, `no_spread`
 */
export function fitCubic(
  temperaturesC: readonly number[],
  offsetsPpm: readonly number[],
  referenceC = REFERENCE_TEMPERATURE_C,
): CubicFit {
  requireSeries(temperaturesC, 'temperaturesC', offsetsPpm, 'offsetsPpm', 4);
  requireFinite(referenceC, 'referenceC');
  const low = Math.min(...temperaturesC);
  const high = Math.max(...temperaturesC);
  const middle = (low + high) / 2;
  const half = (high - low) / 2 || 1;
  const design = temperaturesC.map((temperature) => {
    const x = (temperature - middle) / half;
    return [1, x, x * x, x * x * x];
  });
  const fit = leastSquares(design, offsetsPpm);
  const [b0 = 0, b1 = 0, b2 = 0, b3 = 0] = fit.coefficients;
  const s = (referenceC - middle) / half;
  const spare = temperaturesC.length - 4;
  return {
    referenceC,
    offsetPpm: b0 + s * (b1 + s * (b2 + s * b3)),
    a1PpmPerK: (b1 + s * (2 * b2 + 3 * s * b3)) / half,
    a2PpmPerK2: (b2 + 3 * s * b3) / half ** 2,
    a3PpmPerK3: b3 / half ** 3,
    residualsPpm: fit.residuals,
    leverages: fit.leverages,
    residualSdPpm: spare > 0 ? Math.sqrt(fit.residualSumOfSquares / spare) : null,
  };
}

/**
 * Temperatures of zero slope, lower first: T0 + (-a2 -/+ sqrt(a2^2 - 3 a1 a3)) / (3 a3).
 * @returns two temperatures, one for a parabola, none where the slope never changes sign
 */
export function turningPointsC(curve: TemperatureCubic): number[] {
  const { a1PpmPerK: a1, a2PpmPerK2: a2, a3PpmPerK3: a3, referenceC } = curve;
  if (a3 === 0) return a2 === 0 ? [] : [referenceC - a1 / (2 * a2)];
  const discriminant = a2 * a2 - 3 * a1 * a3;
  if (discriminant < 0) return [];
  // The root whose parts add up, and the other one from their product: nothing cancels.
  const q = -(a2 + (a2 >= 0 ? 1 : -1) * Math.sqrt(discriminant));
  const roots = q === 0 ? [0, 0] : [q / (3 * a3), a1 / q];
  return roots.sort((x, y) => x - y).map((t) => referenceC + t);
}

/** Temperature about which the cubic is antisymmetric, T0 - a2/(3 a3); null without a cubic term. */
export function inflectionC(curve: TemperatureCubic): number | null {
  if (curve.a3PpmPerK3 === 0) return null;
  return curve.referenceC - curve.a2PpmPerK2 / (3 * curve.a3PpmPerK3);
}

export interface OffsetExtremes {
  leastPpm: number;
  leastAtC: number;
  greatestPpm: number;
  greatestAtC: number;
}

/**
 * Least and greatest offset of the curve over a temperature range: at its ends or turning points.
 * @throws ResonatorError `limits_crossed`
 */
export function offsetExtremes(
  curve: TemperatureCubic,
  lowC: number,
  highC: number,
): OffsetExtremes {
  requireRange(lowC, highC, 'temperature range');
  const places = [lowC, ...turningPointsC(curve).filter((t) => t > lowC && t < highC), highC];
  const points = places.map((temperatureC) => ({
    temperatureC,
    offset: cubicOffsetPpm(curve, temperatureC),
  }));
  const least = points.reduce((a, b) => (b.offset < a.offset ? b : a));
  const greatest = points.reduce((a, b) => (b.offset > a.offset ? b : a));
  return {
    leastPpm: least.offset,
    leastAtC: least.temperatureC,
    greatestPpm: greatest.offset,
    greatestAtC: greatest.temperatureC,
  };
}
