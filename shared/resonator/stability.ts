import { requirePositive, ResonatorError } from './errors';

export interface AllanDeviation {
  /** Averaging time tau = m tau0, seconds. */
  averagingTimeS: number;
  /** In the unit of the series: a fraction of frequency. */
  deviation: number;
  /** How many second differences went into it. */
  terms: number;
}

export type AllanKind = 'plain' | 'overlapping' | 'modified';

/** Fewest phase values that give one term. */
const needed = { plain: 2, overlapping: 2, modified: 3 } as const;

/**
 * Phase of a series of mean frequencies: x_0 = 0, x_{k+1} = x_k + (y_k - mean) tau0.
 * A constant offset of frequency does not matter to any Allan deviation; taking it off keeps the
 * phase small and its digits.
 * @param fractional mean fractional frequencies, one after the other without a gap
 * @throws ResonatorError `too_few`, `not_finite`, `out_of_range`
 */
export function phaseFromFrequency(fractional: ArrayLike<number>, tau0S: number): Float64Array {
  requirePositive(tau0S, 'tau0S');
  const count = fractional.length;
  if (count < 2) throw new ResonatorError('too_few', 'fractional', 'must hold at least 2 values');
  let mean = 0;
  for (let i = 0; i < count; i += 1) mean += (fractional[i]! - mean) / (i + 1);
  if (!Number.isFinite(mean)) {
    throw new ResonatorError('not_finite', 'fractional', 'must hold finite numbers only');
  }
  const phase = new Float64Array(count + 1);
  for (let i = 0; i < count; i += 1) phase[i + 1] = phase[i]! + (fractional[i]! - mean) * tau0S;
  return phase;
}

/** Sum and number of squared second differences at stride m, every `step`-th. */
function secondDifferences(phase: Float64Array, m: number, step: number) {
  let sum = 0;
  let terms = 0;
  for (let i = 0; i + 2 * m < phase.length; i += step) {
    sum += (phase[i + 2 * m]! - 2 * phase[i + m]! + phase[i]!) ** 2;
    terms += 1;
  }
  return { sum, terms };
}

/** The same with m adjacent second differences averaged before squaring, by a running sum. */
function averagedDifferences(phase: Float64Array, m: number) {
  const difference = (i: number) => phase[i + 2 * m]! - 2 * phase[i + m]! + phase[i]!;
  const count = phase.length - 3 * m + 1;
  let running = 0;
  for (let i = 0; i < m; i += 1) running += difference(i);
  let sum = (running / m) ** 2;
  for (let i = 1; i < count; i += 1) {
    running += difference(i + m - 1) - difference(i - 1);
    sum += (running / m) ** 2;
  }
  return { sum, terms: count };
}

/**
 * Allan deviation of a phase series: sqrt(sum of squared second differences / (2 terms tau^2)).
 * plain: phases thinned to every m-th; overlapping: all of them; modified: m adjacent second
 * differences averaged before squaring. Linear drift D per second contributes D tau / sqrt 2.
 * @param phaseS phase, seconds, at spacing tau0S
 * @param averagingFactor m, a whole number of 1 or more
 * @throws ResonatorError `too_few`, `out_of_range`
 * @see NIST SP 1065 (2008) section 5.2
 */
export function allanDeviation(
  phaseS: Float64Array,
  tau0S: number,
  averagingFactor: number,
  kind: AllanKind = 'overlapping',
): AllanDeviation {
  const m = averagingFactor;
  if (!Number.isInteger(m) || m < 1) {
    throw new ResonatorError(
      'out_of_range',
      'averagingFactor',
      'must be a whole number of 1 or more',
    );
  }
  const least = needed[kind] * m + (kind === 'modified' ? 0 : 1);
  if (phaseS.length < least) {
    throw new ResonatorError(
      'too_few',
      'phaseS',
      `must hold at least ${least} values for an averaging factor of ${m}`,
    );
  }
  const averagingTimeS = m * requirePositive(tau0S, 'tau0S');
  const { sum, terms } =
    kind === 'modified'
      ? averagedDifferences(phaseS, m)
      : secondDifferences(phaseS, m, kind === 'plain' ? m : 1);
  return { averagingTimeS, deviation: Math.sqrt(sum / (2 * terms)) / averagingTimeS, terms };
}

/** Time deviation, tau / sqrt 3 times the modified Allan deviation, seconds. */
export function timeDeviation(
  phaseS: Float64Array,
  tau0S: number,
  averagingFactor: number,
): number {
  const { deviation, averagingTimeS } = allanDeviation(phaseS, tau0S, averagingFactor, 'modified');
  return (deviation * averagingTimeS) / Math.sqrt(3);
}

/** Averaging factors 1, 2, 4 ... that leave at least `leastTerms` independent differences, for a drawing. */
export function octaveFactors(phaseCount: number, leastTerms = 2): number[] {
  const factors: number[] = [];
  for (let m = 1; (leastTerms + 1) * m + 1 <= phaseCount; m *= 2) factors.push(m);
  return factors;
}
