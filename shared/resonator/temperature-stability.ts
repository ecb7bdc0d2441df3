import { type TemperatureCubic, cubicOffsetPpm, offsetExtremes } from './cubic';
import { requireSeries } from './errors';

/**
 * Stability over a temperature range, stated by its three references. They differ for one and the
 * same curve, so a limit means nothing without the reference (IEC 60679-1, from memory).
 */
export interface TemperatureStability {
  /** Greatest change from the offset at the reference temperature, ppm. */
  fromReferencePpm: number;
  /** Greatest offset from nominal, ppm. */
  fromNominalPpm: number;
  /** Half of greatest minus least, ppm: the band's own middle as reference. */
  halfBandPpm: number;
  leastPpm: number;
  greatestPpm: number;
}

function stabilityOf(least: number, greatest: number, atReference: number): TemperatureStability {
  return {
    fromReferencePpm: Math.max(greatest - atReference, atReference - least, 0),
    fromNominalPpm: Math.max(Math.abs(greatest), Math.abs(least)),
    halfBandPpm: (greatest - least) / 2,
    leastPpm: least,
    greatestPpm: greatest,
  };
}

/**
 * Stability of a fitted curve over lowC to highC, its extremes included wherever they lie.
 * @throws ResonatorError `limits_crossed`, `not_finite`
 */
export function curveStability(
  curve: TemperatureCubic,
  lowC: number,
  highC: number,
): TemperatureStability {
  const { leastPpm, greatestPpm } = offsetExtremes(curve, lowC, highC);
  return stabilityOf(leastPpm, greatestPpm, cubicOffsetPpm(curve, curve.referenceC));
}

/**
 * Stability of the readings themselves. The reading nearest to the reference temperature stands for it.
 * @throws ResonatorError `too_few`, `lengths_differ`, `not_finite`
 */
export function readingStability(
  temperaturesC: readonly number[],
  offsetsPpm: readonly number[],
  referenceC: number,
): TemperatureStability & { referenceReadAtC: number } {
  requireSeries(temperaturesC, 'temperaturesC', offsetsPpm, 'offsetsPpm', 2);
  let nearest = 0;
  temperaturesC.forEach((temperature, i) => {
    const gap = Math.abs(temperature - referenceC);
    if (gap < Math.abs(temperaturesC[nearest]! - referenceC)) nearest = i;
  });
  return {
    ...stabilityOf(Math.min(...offsetsPpm), Math.max(...offsetsPpm), offsetsPpm[nearest]!),
    referenceReadAtC: temperaturesC[nearest]!,
  };
}
