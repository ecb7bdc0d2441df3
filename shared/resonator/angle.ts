import { type TemperatureCubic, REFERENCE_TEMPERATURE_C } from './cubic';
import { requireFinite, requirePositive } from './errors';

/** Slope of a1 with the angle of an AT cut, ppm per kelvin and degree. Also quoted as -5.08. */
export const A1_SENSITIVITY_PPM_PER_K_PER_DEGREE = -5.15;

/**
 * Temperature curve of an AT-cut plate from its angle's difference to the zero-slope angle.
 *
 * a1 = -5.15e-6 d, a2 = 0.39e-9 - 4.7e-9 d, a3 = 109.5e-12 - 20e-12 d, d in degrees, T0 = 25 C.
 * Nominal figures of a bare plate: blank shape, overtone and electrodes shift them, so measured
 * coefficients take precedence wherever they exist.
 *
 * @param angleDifferenceArcmin minutes of arc above the zero-slope angle
 * @see R. Bechmann, Proc. IRE 44 (1956) 1600; Bechmann, Ballato, Lukaszek, Proc. IRE 50 (1962) 1812 (from memory)
 */
export function atCutCurve(
  angleDifferenceArcmin: number,
  referenceC = REFERENCE_TEMPERATURE_C,
): TemperatureCubic {
  const degrees = requireFinite(angleDifferenceArcmin, 'angleDifferenceArcmin') / 60;
  return {
    referenceC: requireFinite(referenceC, 'referenceC'),
    offsetPpm: 0,
    a1PpmPerK: A1_SENSITIVITY_PPM_PER_K_PER_DEGREE * degrees,
    a2PpmPerK2: 0.39e-3 - 4.7e-3 * degrees,
    a3PpmPerK3: 109.5e-6 - 20e-6 * degrees,
  };
}

export interface EqualRippleAngle {
  a1PpmPerK: number;
  /** Greatest offset either way over the range, ppm. */
  peakPpm: number;
  /** Turning points from the inflection, K. */
  turningPointsFromInflectionK: [number, number];
  angleDifferenceArcmin: number;
}

/**
 * The angle that keeps the offset smallest over a range symmetric about the inflection, a2 = 0:
 * a1 = -(3/4) a3 h^2, peak a3 h^3 / 4, turning points at +/-h/2.
 * @param a3PpmPerK3 cubic coefficient, above zero
 * @param halfRangeK h, above zero
 */
export function equalRippleAngle(
  a3PpmPerK3: number,
  halfRangeK: number,
  a1SensitivityPpmPerKPerDegree = A1_SENSITIVITY_PPM_PER_K_PER_DEGREE,
): EqualRippleAngle {
  requirePositive(a3PpmPerK3, 'a3PpmPerK3');
  requirePositive(halfRangeK, 'halfRangeK');
  const a1PpmPerK = -0.75 * a3PpmPerK3 * halfRangeK ** 2;
  return {
    a1PpmPerK,
    peakPpm: (a3PpmPerK3 * halfRangeK ** 3) / 4,
    turningPointsFromInflectionK: [-halfRangeK / 2, halfRangeK / 2],
    angleDifferenceArcmin: (60 * a1PpmPerK) / a1SensitivityPpmPerKPerDegree,
  };
}
