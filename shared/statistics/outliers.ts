import { requireCount, requireOpenShare, requireSpread, requireWhole } from './checks';
import { studentTQuantile } from './distributions/student-t';
import { moments } from './moments';

export interface GrubbsTest {
  /** Largest distance from the mean in standard deviations. */
  g: number;
  critical: number;
  /** The value tested, in the unit of the values. */
  value: number;
  outlier: boolean;
}

/** One step of the generalised ESD procedure. */
export interface EsdStep {
  value: number;
  r: number;
  critical: number;
}

export interface EsdTest {
  /** Values judged outliers, the most extreme first. */
  outliers: number[];
  steps: EsdStep[];
}

/**
 * Two-sided Grubbs test for one outlier: G = max |x - mean|/s against
 * (n-1)/sqrt(n) sqrt(t^2/(n - 2 + t^2)), t the upper alpha/(2n) point with n - 2 degrees.
 * @param values three or more values in any order
 * @param alpha chance of a false alarm, strictly between 0 and 1
 * @throws StatisticsError when fewer than three values, no spread, or alpha out of range
 * Source: NIST/SEMATECH e-Handbook of Statistical Methods, 1.3.5.17.1; Grubbs 1969.
 */
export function grubbs(values: Float64Array, alpha = 0.05): GrubbsTest {
  requireCount(values.length, 'values', 3);
  requireOpenShare(alpha, 'alpha');
  const { n, mean, sd, min, max } = moments(values);
  requireSpread(sd, 'values');
  const value = max - mean >= mean - min ? max : min;
  const g = Math.abs(value - mean) / sd;
  const critical = criticalDistance(n, alpha);
  return { g, critical, value, outlier: g > critical };
}

/**
 * Generalised extreme studentised deviate test: removes the most distant value again and again; the number of outliers is
 * the last step whose distance exceeds its critical value (so that neighbours cannot hide one another).
 * @param sorted ascending, at least maxOutliers + 3 values
 * @param maxOutliers most outliers looked for
 * @throws StatisticsError when too few values, no spread, or alpha out of range
 * Source: B. Rosner, Technometrics 25, 1983; NIST/SEMATECH e-Handbook 1.3.5.17.3.
 */
export function generalisedEsd(sorted: Float64Array, maxOutliers: number, alpha = 0.05): EsdTest {
  requireWhole(maxOutliers, 'maxOutliers', 1);
  requireCount(sorted.length, 'sorted', maxOutliers + 3);
  requireOpenShare(alpha, 'alpha');
  requireSpread(sorted[sorted.length - 1]! - sorted[0]!, 'sorted');
  const remaining = new Remaining(sorted);
  const steps: EsdStep[] = [];
  for (let i = 0; i < maxOutliers; i += 1) {
    const sd = remaining.sd();
    if (!(sd > 0)) break;
    const mean = remaining.mean();
    const fromLow = mean - remaining.lowest();
    const fromHigh = remaining.highest() - mean;
    const value = fromHigh >= fromLow ? remaining.highest() : remaining.lowest();
    steps.push({
      value,
      r: Math.max(fromLow, fromHigh) / sd,
      critical: criticalDistance(sorted.length - i, alpha),
    });
    remaining.drop(fromHigh >= fromLow);
  }
  const last = steps.findLastIndex(({ r, critical }) => r > critical);
  return { outliers: steps.slice(0, last + 1).map(({ value }) => value), steps };
}

/** Critical distance of the most extreme of n values, in standard deviations (Grubbs and each ESD step share it). */
function criticalDistance(n: number, alpha: number): number {
  const t = -studentTQuantile(alpha / (2 * n), n - 2);
  return ((n - 1) / Math.sqrt(n)) * Math.sqrt((t * t) / (n - 2 + t * t));
}

/** A sorted run that loses values at its ends while mean and spread follow without another pass. */
class Remaining {
  private from = 0;
  private to: number;
  private centre = 0;
  private sum = 0;
  private squares = 0;
  private squaresAtPass = 0;

  constructor(private readonly sorted: Float64Array) {
    this.to = sorted.length;
    this.pass();
  }

  lowest(): number {
    return this.sorted[this.from]!;
  }

  highest(): number {
    return this.sorted[this.to - 1]!;
  }

  mean(): number {
    return this.centre + this.sum / (this.to - this.from);
  }

  sd(): number {
    const n = this.to - this.from;
    if (this.lowest() === this.highest()) return 0;
    return Math.sqrt(Math.max(0, this.squares - (this.sum * this.sum) / n) / (n - 1));
  }

  drop(highest: boolean): void {
    const d = (highest ? this.highest() : this.lowest()) - this.centre;
    if (highest) this.to -= 1;
    else this.from += 1;
    this.sum -= d;
    this.squares -= d * d;
    // What a far value leaves behind is rounding; a fresh pass brings the digits back.
    if (this.squares < 0.01 * this.squaresAtPass) this.pass();
  }

  private pass(): void {
    this.centre = this.sorted[(this.from + this.to) >> 1]!;
    let sum = 0;
    let squares = 0;
    for (let i = this.from; i < this.to; i += 1) {
      const d = this.sorted[i]! - this.centre;
      sum += d;
      squares += d * d;
    }
    this.sum = sum;
    this.squares = squares;
    this.squaresAtPass = squares;
  }
}
