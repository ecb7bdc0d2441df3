import { studentTQuantile } from '../../statistics/distributions/student-t';
import { requireNonNegative, requireSeries } from '../errors';
import { leastSquares } from '../least-squares';

/** offset(t) = A ln(B t + 1) + f0. */
export interface LogarithmicLaw {
  readonly amplitudePpm: number;
  readonly ratePerDay: number;
  readonly startPpm: number;
}

export interface LogarithmicAgeing extends LogarithmicLaw {
  readonly model: 'logarithmic';
  readonly state: 'determined';
  residualSdPpm: number;
  degreesOfFreedom: number;
  /** (J^T J)^-1 for [A, B, f0]. */
  inverseNormal: number[][];
  firstDay: number;
  lastDay: number;
}

/** Why the readings do not determine the logarithmic law. */
export type NotDeterminedReason =
  'too-few-readings' | 'no-trend' | 'like-a-line' | 'only-slope-in-log-time';

export interface AgeingNotDetermined {
  readonly model: 'logarithmic';
  readonly state: 'not-determined';
  reason: NotDeterminedReason;
  explanation: string;
}

const EXPLANATION: Record<NotDeterminedReason, string> = {
  'too-few-readings':
    'Fewer than four readings at different times: three constants leave nothing to judge the fit by.',
  'no-trend':
    'No change with time stands out from the scatter of the readings; go on reading for longer.',
  'like-a-line':
    'Over this span the law cannot be told from a straight line: its bend, and so every projection, is open.',
  'only-slope-in-log-time':
    'The readings start too late to show the early bend: only the slope against the logarithm of time is determined. Use the log-linear law.',
};

export const logarithmicOffsetPpm = (law: LogarithmicLaw, days: number): number =>
  law.amplitudePpm * Math.log1p(law.ratePerDay * requireNonNegative(days, 'days')) + law.startPpm;

/** Rate of change A B / (B t + 1), ppm per day. */
export const logarithmicRatePpmPerDay = (law: LogarithmicLaw, days: number): number =>
  (law.amplitudePpm * law.ratePerDay) / (law.ratePerDay * requireNonNegative(days, 'days') + 1);

interface Regression {
  slope: number;
  intercept: number;
  sumOfSquares: number;
}

function regress(x: readonly number[], y: readonly number[]): Regression {
  const count = x.length;
  const meanX = x.reduce((sum, v) => sum + v, 0) / count;
  const meanY = y.reduce((sum, v) => sum + v, 0) / count;
  let xx = 0;
  let xy = 0;
  for (let i = 0; i < count; i += 1) {
    xx += (x[i]! - meanX) ** 2;
    xy += (x[i]! - meanX) * (y[i]! - meanY);
  }
  const slope = xy / xx;
  let sumOfSquares = 0;
  for (let i = 0; i < count; i += 1) {
    sumOfSquares += (y[i]! - meanY - slope * (x[i]! - meanX)) ** 2;
  }
  return { slope, intercept: meanY - slope * meanX, sumOfSquares };
}

const atLogRate = (logRate: number, days: readonly number[], y: readonly number[]) => {
  const rate = Math.exp(logRate);
  return regress(
    days.map((t) => Math.log1p(rate * t)),
    y,
  );
};

/** Least sum of squares over ln B: a scan from B t << 1 to B t >> 1, then golden section. */
function bestLogRate(days: readonly number[], y: readonly number[]): number {
  const positive = days.filter((t) => t > 0);
  const from = Math.log(1e-4 / Math.max(...positive));
  const to = Math.log(1e5 / Math.min(...positive));
  const step = 0.1;
  let best = from;
  let least = Infinity;
  for (let logRate = from; logRate <= to; logRate += step) {
    const { sumOfSquares } = atLogRate(logRate, days, y);
    if (sumOfSquares < least) {
      least = sumOfSquares;
      best = logRate;
    }
  }
  const golden = (Math.sqrt(5) - 1) / 2;
  let low = best - step;
  let high = best + step;
  while (high - low > 1e-9) {
    const inner = (high - low) * golden;
    const left = high - inner;
    const right = low + inner;
    if (atLogRate(left, days, y).sumOfSquares < atLogRate(right, days, y).sumOfSquares)
      high = right;
    else low = left;
  }
  return (low + high) / 2;
}

const jacobian = ({ amplitudePpm, ratePerDay }: LogarithmicLaw, t: number): number[] => [
  Math.log1p(ratePerDay * t),
  (amplitudePpm * t) / (ratePerDay * t + 1),
  1,
];

/** The row [dA, dB, df0] of the law at a time, for standard errors. */
export const logarithmicGradient = (law: LogarithmicLaw, days: number): number[] =>
  jacobian(law, days);

const notDetermined = (reason: NotDeterminedReason): AgeingNotDetermined => ({
  model: 'logarithmic',
  state: 'not-determined',
  reason,
  explanation: EXPLANATION[reason],
});

/**
 * Logarithmic ageing f(t) = A ln(B t + 1) + f0 through one unit's offsets, unweighted least squares.
 *
 * ln B is scanned with A and f0 solved linearly at each step, then all three are polished by
 * Gauss-Newton. B is weakly determined when B t stays far below one (a line) or far above one (only A
 * and A ln B + f0 are determined): where the limiting law fits no worse than chance explains (F test at
 * 5 %, one and n - 3 degrees of freedom), "not determined" is returned with its reason, not numbers.
 *
 * @param days from the start of stabilisation, zero or above
 * @param offsetsPpm one per day
 * @throws ResonatorError `too_few`, `lengths_differ`, `not_finite`, `out_of_range`
 * @see MIL-PRF-55310 ageing fit (read as a public quotation); variable projection of separable least squares
 */
export function fitLogarithmicAgeing(
  days: readonly number[],
  offsetsPpm: readonly number[],
): LogarithmicAgeing | AgeingNotDetermined {
  requireSeries(days, 'days', offsetsPpm, 'offsetsPpm', 1);
  days.forEach((t) => requireNonNegative(t, 'days'));
  if (new Set(days).size < 4) return notDetermined('too-few-readings');
  const degreesOfFreedom = days.length - 3;

  const logRate = bestLogRate(days, offsetsPpm);
  const start = atLogRate(logRate, days, offsetsPpm);
  const mean = offsetsPpm.reduce((sum, y) => sum + y, 0) / offsetsPpm.length;
  const total = offsetsPpm.reduce((sum, y) => sum + (y - mean) ** 2, 0);
  // Rounding of the readings' own digits: an exact law is determined, exact repetition is not.
  const floor = 1e-24 * (total + mean ** 2 * days.length) + Number.MIN_VALUE;
  const variance = (start.sumOfSquares + floor) / degreesOfFreedom;
  const critical = studentTQuantile(0.975, degreesOfFreedom) ** 2;
  const noWorse = (sumOfSquares: number, constants: number) =>
    (sumOfSquares - start.sumOfSquares) / constants / variance <= critical;
  if (noWorse(total, 2)) return notDetermined('no-trend');
  if (noWorse(regress(days, offsetsPpm).sumOfSquares, 1)) return notDetermined('like-a-line');
  if (days.every((t) => t > 0)) {
    const logTime = regress(days.map(Math.log), offsetsPpm);
    if (noWorse(logTime.sumOfSquares, 1)) return notDetermined('only-slope-in-log-time');
  }

  let law: LogarithmicLaw = {
    amplitudePpm: start.slope,
    ratePerDay: Math.exp(logRate),
    startPpm: start.intercept,
  };
  const linearised = () =>
    leastSquares(
      days.map((t) => jacobian(law, t)),
      days.map((t, i) => offsetsPpm[i]! - logarithmicOffsetPpm(law, t)),
    );
  for (let step = 0; step < 4; step += 1) {
    const [dA = 0, dB = 0, dF = 0] = linearised().coefficients;
    if (!(law.ratePerDay + dB > 0)) break;
    law = {
      amplitudePpm: law.amplitudePpm + dA,
      ratePerDay: law.ratePerDay + dB,
      startPpm: law.startPpm + dF,
    };
  }
  const { inverseNormal } = linearised();
  const sumOfSquares = days.reduce(
    (sum, t, i) => sum + (offsetsPpm[i]! - logarithmicOffsetPpm(law, t)) ** 2,
    0,
  );
  return {
    model: 'logarithmic',
    state: 'determined',
    ...law,
    residualSdPpm: Math.sqrt(sumOfSquares / degreesOfFreedom),
    degreesOfFreedom,
    inverseNormal,
    firstDay: Math.min(...days),
    lastDay: Math.max(...days),
  };
}
