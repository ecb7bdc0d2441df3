import { requireFinite, requireNonNegative, requirePositive } from './errors';

/** Equivalent circuit of a crystal unit: a series arm L1, C1, R1 and a shunt C0. */
export interface CrystalCircuit {
  /** Series resonance frequency, Hz. */
  readonly seriesHz: number;
  /** Motional capacitance C1, femtofarad. */
  readonly motionalCapacitanceFf: number;
  /** Shunt capacitance C0, picofarad. */
  readonly shuntCapacitancePf: number;
  /** Motional resistance R1, ohm. */
  readonly motionalResistanceOhm: number;
}

type Capacitances = Pick<CrystalCircuit, 'motionalCapacitanceFf' | 'shuntCapacitancePf'>;

function capacitancesPf(crystal: Capacitances) {
  return {
    c1: requirePositive(crystal.motionalCapacitanceFf, 'motionalCapacitanceFf') / 1000,
    c0: requireNonNegative(crystal.shuntCapacitancePf, 'shuntCapacitancePf'),
  };
}

/** sqrt(1 + x) - 1 without cancellation. */
const rootExcess = (x: number): number => x / (1 + Math.sqrt(1 + x));

export interface LoadResonance {
  /** First order: f_s (1 + C1 / (2 (C0 + CL))). */
  loadHzFirstOrder: number;
  /** f_s sqrt(1 + C1 / (C0 + CL)). */
  loadHz: number;
  /** Load resonance offset D_L, first order and exact, ppm of the series resonance. */
  loadOffsetFirstOrderPpm: number;
  loadOffsetPpm: number;
  /** Trim sensitivity S = -C1 / (2 (C0 + CL)^2), ppm per picofarad. */
  trimSensitivityPpmPerPf: number;
  /** Resistance at load resonance, R1 (1 + C0/CL)^2, ohm: the "ESR at load". */
  loadResistanceOhm: number;
}

/**
 * A crystal unit with a load capacitance.
 * @param loadPf CL, picofarad, above zero
 * @throws ResonatorError `not_finite`, `out_of_range`
 * @see IEC 60122-1, IEC 60444 series (from memory); circuit theory to first order
 */
export function loadResonance(crystal: CrystalCircuit, loadPf: number): LoadResonance {
  const { c1, c0 } = capacitancesPf(crystal);
  const total = c0 + requirePositive(loadPf, 'loadPf');
  const seriesHz = requirePositive(crystal.seriesHz, 'seriesHz');
  const firstOrder = c1 / (2 * total);
  const exact = rootExcess(c1 / total);
  return {
    loadHzFirstOrder: seriesHz * (1 + firstOrder),
    loadHz: seriesHz * (1 + exact),
    loadOffsetFirstOrderPpm: firstOrder * 1e6,
    loadOffsetPpm: exact * 1e6,
    trimSensitivityPpmPerPf: (-firstOrder / total) * 1e6,
    loadResistanceOhm:
      requireNonNegative(crystal.motionalResistanceOhm, 'motionalResistanceOhm') *
      (1 + c0 / loadPf) ** 2,
  };
}

export interface CrystalQuality {
  motionalInductanceH: number;
  /** Q = 1 / (2 pi f_s R1 C1). */
  qualityFactor: number;
  /** R1 C1, seconds. */
  motionalTimeConstantS: number;
  /** r = C0 / C1. */
  capacitanceRatio: number;
  /** M = Q / r. */
  figureOfMerit: number;
  /** Antiresonance f_s sqrt(1 + C1/C0), Hz. */
  parallelHz: number;
}

/** Figures of the unit itself. @throws ResonatorError `not_finite`, `out_of_range` */
export function crystalQuality(crystal: CrystalCircuit): CrystalQuality {
  const { c1, c0 } = capacitancesPf(crystal);
  requirePositive(c0, 'shuntCapacitancePf');
  const omega = 2 * Math.PI * requirePositive(crystal.seriesHz, 'seriesHz');
  const motionalTimeConstantS =
    requirePositive(crystal.motionalResistanceOhm, 'motionalResistanceOhm') * c1 * 1e-12;
  const qualityFactor = 1 / (omega * motionalTimeConstantS);
  const capacitanceRatio = c0 / c1;
  return {
    motionalInductanceH: 1 / (omega ** 2 * c1 * 1e-12),
    qualityFactor,
    motionalTimeConstantS,
    capacitanceRatio,
    figureOfMerit: qualityFactor / capacitanceRatio,
    parallelHz: crystal.seriesHz * (1 + rootExcess(c1 / c0)),
  };
}

/** First-order pulling from one load to another, (C1/2)(1/(C0+CL2) - 1/(C0+CL1)), ppm. */
export function pullingPpm(crystal: Capacitances, fromLoadPf: number, toLoadPf: number): number {
  const { c1, c0 } = capacitancesPf(crystal);
  const from = c0 + requirePositive(fromLoadPf, 'fromLoadPf');
  const to = c0 + requirePositive(toLoadPf, 'toLoadPf');
  return ((c1 * (from - to)) / (2 * from * to)) * 1e6;
}

/**
 * The offset that a unit read at one load would have at another, both from the same nominal, ppm.
 * Exact: 1 + y2 = (1 + y1) sqrt((1 + C1/(C0+CL2)) / (1 + C1/(C0+CL1))).
 * @param offsetPpm as read at `readAtLoadPf`
 */
export function offsetAtLoadPpm(
  offsetPpm: number,
  crystal: Capacitances,
  readAtLoadPf: number,
  wantedLoadPf: number,
): number {
  const { c1, c0 } = capacitancesPf(crystal);
  const read = c0 + requirePositive(readAtLoadPf, 'readAtLoadPf');
  const wanted = c0 + requirePositive(wantedLoadPf, 'wantedLoadPf');
  const ratioExcess = rootExcess((c1 * (read - wanted)) / (wanted * (read + c1)));
  return requireFinite(offsetPpm, 'offsetPpm') + ratioExcess * 1e6 + offsetPpm * ratioExcess;
}

/**
 * The same by the trim sensitivity alone, for a unit whose C1 and C0 are not known: y + S (CL2 - CL1).
 * The slope bends with load; good for a few tenths of a picofarad.
 */
export function offsetByTrimSensitivityPpm(
  offsetPpm: number,
  trimSensitivityPpmPerPf: number,
  loadChangePf: number,
): number {
  return (
    requireFinite(offsetPpm, 'offsetPpm') +
    requireFinite(trimSensitivityPpmPerPf, 'trimSensitivityPpmPerPf') *
      requireFinite(loadChangePf, 'loadChangePf')
  );
}

/** Load of a two-capacitor oscillator: Ca Cb / (Ca + Cb) + stray, picofarad (common practice). */
export function oscillatorLoadPf(aPf: number, bPf: number, strayPf: number): number {
  requirePositive(aPf, 'aPf');
  requirePositive(bPf, 'bPf');
  return (aPf * bPf) / (aPf + bPf) + requireNonNegative(strayPf, 'strayPf');
}
