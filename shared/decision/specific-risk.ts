import { requireFinite, requirePositive } from '../statistics/checks';
import { normalCdf, normalUpperTail } from '../statistics/distributions/normal';
import { requireLimits } from './checks';
import { type Limits } from './rule';

export interface ConformingProbability {
  conforming: number;
  /** 1 - conforming, from the tails, so that small risks keep their digits. */
  nonconforming: number;
}

/**
 * Probability that the true value lies within the limits, given one measured value:
 * p = Phi((T_U - y)/u) - Phi((T_L - y)/u).
 * @param valuePpm y, measured, or the posterior mean
 * @param standardUncertaintyPpm u, above zero
 * @throws StatisticsError when an argument is out of range
 * Source: JCGM 106:2012, clause 7 (from memory).
 */
export function conformingProbability(
  valuePpm: number,
  standardUncertaintyPpm: number,
  limits: Limits,
): ConformingProbability {
  requireFinite(valuePpm, 'valuePpm');
  requirePositive(standardUncertaintyPpm, 'standardUncertaintyPpm');
  requireLimits(limits);
  const { lowPpm, highPpm } = limits;
  const above =
    highPpm === null ? 0 : normalUpperTail((highPpm - valuePpm) / standardUncertaintyPpm);
  const below = lowPpm === null ? 0 : normalCdf((lowPpm - valuePpm) / standardUncertaintyPpm);
  const nonconforming = Math.min(1, above + below);
  // The larger part is the complement of the smaller: far beyond a limit it is p that is small.
  const conforming =
    nonconforming < 0.5
      ? 1 - nonconforming
      : insideProbability(valuePpm, standardUncertaintyPpm, limits);
  return { conforming, nonconforming };
}

function insideProbability(valuePpm: number, u: number, { lowPpm, highPpm }: Limits): number {
  const zLow = lowPpm === null ? -Infinity : (lowPpm - valuePpm) / u;
  const zHigh = highPpm === null ? Infinity : (highPpm - valuePpm) / u;
  return zLow > 0
    ? normalUpperTail(zLow) - normalUpperTail(zHigh)
    : normalCdf(zHigh) - normalCdf(zLow);
}

export interface NormalKnowledge {
  meanPpm: number;
  sdPpm: number;
}

/**
 * A measured value joined with what is known of the process, normal with normal: weights are reciprocal variances.
 * @param process prior mean and standard deviation of the true values, sd above zero
 * @returns mean and standard deviation of the true value, ppm
 * @throws StatisticsError when an argument is out of range
 * Source: JCGM 106:2012, 7.2.2 (from memory).
 */
export function posterior(
  measuredPpm: number,
  standardUncertaintyPpm: number,
  process: NormalKnowledge,
): NormalKnowledge {
  requireFinite(measuredPpm, 'measuredPpm');
  requirePositive(standardUncertaintyPpm, 'standardUncertaintyPpm');
  requireFinite(process.meanPpm, 'process.meanPpm');
  requirePositive(process.sdPpm, 'process.sdPpm');
  const priorWeight = 1 / process.sdPpm ** 2;
  const readingWeight = 1 / standardUncertaintyPpm ** 2;
  const total = priorWeight + readingWeight;
  return {
    meanPpm: (process.meanPpm * priorWeight + measuredPpm * readingWeight) / total,
    sdPpm: 1 / Math.sqrt(total),
  };
}

export interface SpecificRisk {
  /** Consumer's: an accepted unit is nonconforming. Producer's: a refused unit conforms. */
  kind: 'consumer' | 'producer';
  risk: number;
}

/** The risk of a decision on one unit. Source: JCGM 106:2012, clause 9.3 (from memory). */
export function specificRisk(
  { conforming, nonconforming }: ConformingProbability,
  accepted: boolean,
): SpecificRisk {
  return accepted
    ? { kind: 'consumer', risk: nonconforming }
    : { kind: 'producer', risk: conforming };
}
