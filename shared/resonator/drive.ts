import { requireNonNegative, requirePositive, requireSeries, ResonatorError } from './errors';

export interface DriveLevel {
  currentRmsA: number;
  powerW: number;
}

/**
 * Level of drive from the voltage across the crystal:
 * I = 2 pi f V (C0 + CL), P = I^2 R_L (common practice).
 * @param loadResistanceOhm R_L at the load, ohm
 */
export function driveLevel(
  frequencyHz: number,
  voltageRmsV: number,
  loadResistanceOhm: number,
  loadPf: number,
  shuntCapacitancePf: number,
): DriveLevel {
  const capacitanceF =
    (requirePositive(loadPf, 'loadPf') +
      requireNonNegative(shuntCapacitancePf, 'shuntCapacitancePf')) *
    1e-12;
  const currentRmsA =
    2 *
    Math.PI *
    requirePositive(frequencyHz, 'frequencyHz') *
    requireNonNegative(voltageRmsV, 'voltageRmsV') *
    capacitanceF;
  return {
    currentRmsA,
    powerW: currentRmsA ** 2 * requirePositive(loadResistanceOhm, 'loadResistanceOhm'),
  };
}

export interface DriveDependence {
  /** Greatest over least resistance of the sweep. */
  ratioMaxToMin: number;
  /** Resistance at the lowest drive over that at the highest, taken as nominal. */
  ratioLowestDriveToNominal: number;
  frequencySpanPpm: number;
  withinRatioLimit: boolean;
}

/**
 * Drive level dependence from a sweep. A unit that resists at low drive may fail to start.
 * @param driveUw drive, microwatt, any order
 * @param resistanceOhm resonance resistance at each drive
 * @param offsetPpm frequency offset at each drive
 * @param ratioLimit contractual limit of greatest over least resistance
 * @throws ResonatorError `too_few`, `lengths_differ`, `not_finite`, `out_of_range`
 * @see IEC 60444-6 (from memory); limits are contractual
 */
export function driveDependence(
  driveUw: readonly number[],
  resistanceOhm: readonly number[],
  offsetPpm: readonly number[],
  ratioLimit: number,
): DriveDependence {
  requireSeries(driveUw, 'driveUw', resistanceOhm, 'resistanceOhm', 2);
  requireSeries(driveUw, 'driveUw', offsetPpm, 'offsetPpm', 2);
  requirePositive(ratioLimit, 'ratioLimit');
  const least = Math.min(...resistanceOhm);
  requirePositive(least, 'resistanceOhm');
  const lowest = driveUw.indexOf(Math.min(...driveUw));
  const highest = driveUw.indexOf(Math.max(...driveUw));
  if (lowest === highest) {
    throw new ResonatorError('no_spread', 'driveUw', 'must hold at least two different levels');
  }
  const ratioMaxToMin = Math.max(...resistanceOhm) / least;
  return {
    ratioMaxToMin,
    ratioLowestDriveToNominal: resistanceOhm[lowest]! / resistanceOhm[highest]!,
    frequencySpanPpm: Math.max(...offsetPpm) - Math.min(...offsetPpm),
    withinRatioLimit: ratioMaxToMin <= ratioLimit,
  };
}
