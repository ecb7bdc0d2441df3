import { requireCount, requirePositive, requireWhole } from '../statistics/checks';
import { studentTQuantile } from '../statistics/distributions/student-t';
import { StatisticsError } from '../statistics/errors';
import { requireNotNegative } from './checks';

export interface MeasuringSession {
  units: number;
  /** Which time base the session ran on; sessions on one time base share its error. */
  timeBase: string;
  /** Standard uncertainty of that time base, ppm. */
  timeBaseStandardPpm: number;
}

export interface LotMeanInput {
  sessions: readonly MeasuringSession[];
  /** Observed standard deviation of the units, ppm; it contains the repeatability of the counter. */
  spreadPpm: number;
  /** Standard uncertainty of one reading from resolution and repeatability, ppm. Default 0. */
  repeatabilityPpm?: number;
  /** With it the part of the lot that was measured no longer counts as unknown. */
  lotSize?: number;
}

export interface LotMeanUncertainty {
  /** Shrinks with the number of units. */
  samplingPpm: number;
  /** Does not. */
  commonPpm: number;
  combinedPpm: number;
  coverageFactor: number;
  expandedPpm: number;
  effectiveDegrees: number;
  /** Part of the combined variance that no further unit can remove. */
  commonShare: number;
}

const MANY_DEGREES = 30;

/**
 * Uncertainty of the mean offset of a lot. The error of a time base is the same for every unit measured on it: it
 * moves the mean and is not averaged away. Units average; sessions on one time base add linearly by their weights
 * w_i = n_i/n, different time bases by root-sum-square:
 * u^2 = ((s^2 - r^2)(1 - n/N) + r^2)/n + sum over time bases (sum w_i u_i)^2.
 * k is 2 above 30 effective degrees, else Student's t for 95 %.
 * @throws StatisticsError with fewer than two units or an argument out of range
 * Source: JCGM 100:2008, 5.2 (correlated inputs), G.4; W. G. Cochran, Sampling Techniques, 2.6 (finite lot); from memory.
 */
export function lotMeanUncertainty({
  sessions,
  spreadPpm,
  repeatabilityPpm = 0,
  lotSize,
}: LotMeanInput): LotMeanUncertainty {
  requireCount(sessions.length, 'sessions', 1);
  sessions.forEach(({ units, timeBaseStandardPpm }) => {
    requireWhole(units, 'sessions.units', 1);
    requireNotNegative(timeBaseStandardPpm, 'sessions.timeBaseStandardPpm');
  });
  const units = sessions.reduce((sum, session) => sum + session.units, 0);
  requireCount(units, 'sessions', 2);
  requirePositive(spreadPpm, 'spreadPpm');
  requireNotNegative(repeatabilityPpm, 'repeatabilityPpm');
  if (lotSize !== undefined && lotSize < units)
    throw new StatisticsError(
      'out_of_range',
      'lotSize',
      `must not be below the ${units} units measured, got ${lotSize}`,
    );
  const unknown = lotSize === undefined ? 1 : 1 - units / lotSize;
  const repeatVariance = Math.min(repeatabilityPpm, spreadPpm) ** 2;
  const samplingPpm = Math.sqrt(
    ((spreadPpm ** 2 - repeatVariance) * unknown + repeatVariance) / units,
  );
  const commonPpm = commonUncertainty(sessions, units);
  const combinedPpm = Math.hypot(samplingPpm, commonPpm);
  const effectiveDegrees =
    samplingPpm === 0 ? Infinity : (combinedPpm / samplingPpm) ** 4 * (units - 1);
  const coverageFactor =
    effectiveDegrees > MANY_DEGREES ? 2 : studentTQuantile(0.975, effectiveDegrees);
  return {
    samplingPpm,
    commonPpm,
    combinedPpm,
    coverageFactor,
    expandedPpm: coverageFactor * combinedPpm,
    effectiveDegrees,
    commonShare: combinedPpm === 0 ? 0 : (commonPpm / combinedPpm) ** 2,
  };
}

function commonUncertainty(sessions: readonly MeasuringSession[], units: number): number {
  const byTimeBase = new Map<string, number>();
  for (const session of sessions) {
    const share = (session.units / units) * session.timeBaseStandardPpm;
    byTimeBase.set(session.timeBase, (byTimeBase.get(session.timeBase) ?? 0) + share);
  }
  return Math.hypot(...byTimeBase.values());
}
