import { studentTQuantile } from '../statistics/distributions/student-t';
import { fitCubic, type CubicFit } from './cubic';
import { requirePositive, requireSeries, ResonatorError } from './errors';

export interface ActivityDipRule {
  /** Residual from the cubic above which a reading is suspect, ppm; without it a statistical limit is used. */
  readonly residualLimitPpm?: number;
  /** Resonance resistance over its median above which a reading is suspect; 1.5 when absent (common practice; limits are contractual). */
  readonly resistanceRatioLimit?: number;
  /** Chance of a false alarm for a unit without dips, statistical limit; 0.01 when absent. */
  readonly falseAlarm?: number;
}

export interface SuspectReading {
  index: number;
  temperatureC: number;
  /** Distance from the cubic through the other readings, ppm. */
  residualPpm: number;
  resistanceRatio: number | null;
  /**
   * `dip`: frequency and resistance both depart; `frequency`: the frequency departs and no resistance
   * was read; `frequency-only`: resistance was read and is normal; `resistance-only`.
   */
  kind: 'dip' | 'frequency' | 'frequency-only' | 'resistance-only';
}

export interface ActivityDipFinding {
  /** Cubic through the readings that are not suspect by frequency. */
  curve: CubicFit;
  suspects: SuspectReading[];
}

/** A cubic and an honest residual spread need more than the four readings of the cubic itself. */
const LEAST_KEPT = 6;

function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  return sorted.length % 2 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
}

/** The kept reading farthest off the cubic through the others, when that is too far. */
function farthest(fit: CubicFit, kept: readonly number[], rule: ActivityDipRule, all: number) {
  const n = kept.length;
  const sumOfSquares = fit.residualsPpm.reduce((sum, r) => sum + r * r, 0);
  const critical = studentTQuantile(1 - (rule.falseAlarm ?? 0.01) / (2 * all), n - 5);
  let worst: { position: number; excess: number } | null = null;
  fit.residualsPpm.forEach((residual, position) => {
    const free = 1 - fit.leverages[position]!;
    if (free < 1e-9) return;
    const deletedPpm = Math.abs(residual) / free;
    const others = Math.max(0, sumOfSquares - residual ** 2 / free) / (n - 5);
    const limitPpm = rule.residualLimitPpm ?? critical * Math.sqrt(others / free);
    // Rounding is no dip: readings on an exact cubic leave residuals of the last digit.
    const excess = deletedPpm > 1e-9 ? deletedPpm / limitPpm : 0;
    if (excess > 1 && excess > (worst?.excess ?? 0)) worst = { position, excess };
  });
  return worst as { position: number; excess: number } | null;
}

/**
 * Residual test for activity dips: readings that leave the smooth curve in a narrow interval of
 * temperature, with a rise of resistance where it was read.
 *
 * The reading farthest off the cubic through the others is set aside while it exceeds the limit, then
 * the cubic is fitted anew, so that a dip does not bend the curve that it is judged by. Without a
 * contractual limit the externally studentised residual is compared with Student's t for n - 5
 * degrees of freedom at falseAlarm/(2n) (Bonferroni).
 *
 * @param temperaturesC at least seven
 * @param offsetsPpm one per temperature
 * @param resistancesOhm resonance resistance at each temperature, if read
 * @throws ResonatorError `too_few`, `lengths_differ`, `not_finite`, `out_of_range`
 * @see IEC 60444-7 (from memory) for the phenomenon; R. D. Cook and S. Weisberg, Residuals and
 *   Influence in Regression, 1982, for the test
 */
export function findActivityDips(
  temperaturesC: readonly number[],
  offsetsPpm: readonly number[],
  resistancesOhm: readonly number[] | null = null,
  rule: ActivityDipRule = {},
): ActivityDipFinding {
  requireSeries(temperaturesC, 'temperaturesC', offsetsPpm, 'offsetsPpm', LEAST_KEPT + 1);
  if (rule.residualLimitPpm !== undefined)
    requirePositive(rule.residualLimitPpm, 'residualLimitPpm');
  const ratioLimit = requirePositive(rule.resistanceRatioLimit ?? 1.5, 'resistanceRatioLimit');
  if (resistancesOhm && resistancesOhm.length !== temperaturesC.length) {
    throw new ResonatorError(
      'lengths_differ',
      'resistancesOhm',
      'must have one value per temperature',
    );
  }

  let kept = temperaturesC.map((_, i) => i);
  const fitKept = () =>
    fitCubic(
      kept.map((i) => temperaturesC[i]!),
      kept.map((i) => offsetsPpm[i]!),
    );
  let curve = fitKept();
  const setAside: SuspectReading[] = [];
  const typicalOhm = resistancesOhm ? requirePositive(median(resistancesOhm), 'resistancesOhm') : 1;
  const ratioAt = (index: number) => (resistancesOhm ? resistancesOhm[index]! / typicalOhm : null);

  while (kept.length > LEAST_KEPT) {
    const worst = farthest(curve, kept, rule, temperaturesC.length);
    if (!worst) break;
    const index = kept[worst.position]!;
    const residualPpm =
      curve.residualsPpm[worst.position]! / (1 - curve.leverages[worst.position]!);
    const resistanceRatio = ratioAt(index);
    const kind =
      resistanceRatio === null
        ? 'frequency'
        : resistanceRatio > ratioLimit
          ? 'dip'
          : 'frequency-only';
    setAside.push({
      index,
      temperatureC: temperaturesC[index]!,
      residualPpm,
      resistanceRatio,
      kind,
    });
    kept = kept.filter((i) => i !== index);
    curve = fitKept();
  }
  const byResistance = kept.flatMap((index, position): SuspectReading[] => {
    const resistanceRatio = ratioAt(index);
    if (resistanceRatio === null || resistanceRatio <= ratioLimit) return [];
    const residualPpm = curve.residualsPpm[position]!;
    return [
      {
        index,
        temperatureC: temperaturesC[index]!,
        residualPpm,
        resistanceRatio,
        kind: 'resistance-only',
      },
    ];
  });
  const suspects = [...setAside, ...byResistance].sort((a, b) => a.temperatureC - b.temperatureC);
  return { curve, suspects };
}
