import { requireFinite } from './errors';

/** Usual curvature of a tuning-fork crystal, ppm per square kelvin (common practice; units spread by about 0.006). */
export const FORK_CURVATURE_PPM_PER_K2 = -0.034;
/** Usual turning point, degrees Celsius (common practice; within about 5 of it). */
export const FORK_TURNING_POINT_C = 25;

/**
 * Offset of a tuning-fork crystal at a temperature: b (T - T0)^2, ppm.
 * @param curvaturePpmPerK2 b, below zero for every known fork
 */
export function forkOffsetPpm(
  temperatureC: number,
  curvaturePpmPerK2 = FORK_CURVATURE_PPM_PER_K2,
  turningPointC = FORK_TURNING_POINT_C,
): number {
  requireFinite(curvaturePpmPerK2, 'curvaturePpmPerK2');
  const t =
    requireFinite(temperatureC, 'temperatureC') - requireFinite(turningPointC, 'turningPointC');
  return curvaturePpmPerK2 * t * t;
}

/** What a clock gains per day at an offset: one day's seconds times 1e-6, 0.0864 s per ppm. */
export function secondsPerDay(offsetPpm: number): number {
  return requireFinite(offsetPpm, 'offsetPpm') * 0.0864;
}
