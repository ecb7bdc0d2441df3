import { requirePositive } from '../statistics/checks';
import { requireLimits, requireNotNegative } from './checks';
import { conformingProbability } from './specific-risk';
import { type DecisionRule, type Limits } from './rule';

/**
 * Width of the guard band, w = factor x U in ppm; 0 for simple acceptance.
 * @param expandedUncertaintyPpm U of one reading
 * @throws StatisticsError when U or the factor is below zero
 * Source: JCGM 106:2012, 8.3 (from memory); ISO 14253-1.
 */
export function guardBandPpm(rule: DecisionRule, expandedUncertaintyPpm: number): number {
  requireNotNegative(expandedUncertaintyPpm, 'expandedUncertaintyPpm');
  if (rule.kind === 'simple') return 0;
  requireNotNegative(rule.factor, 'factor');
  return rule.factor * expandedUncertaintyPpm;
}

export interface AcceptanceLimits extends Limits {
  guardBandPpm: number;
  /** The guard bands leave nothing between them: no unit can be accepted. */
  empty: boolean;
}

/**
 * The limits that the measured value is held against: the specification limits, drawn in by w (guarded acceptance)
 * or let out by w (guarded rejection).
 * @throws StatisticsError when limits are missing or crossed, or as guardBandPpm
 */
export function acceptanceLimits(
  limits: Limits,
  rule: DecisionRule,
  expandedUncertaintyPpm: number,
): AcceptanceLimits {
  requireLimits(limits);
  const width = guardBandPpm(rule, expandedUncertaintyPpm);
  const inward = rule.kind === 'guardedRejection' ? -width : width;
  const lowPpm = limits.lowPpm === null ? null : limits.lowPpm + inward;
  const highPpm = limits.highPpm === null ? null : limits.highPpm - inward;
  return {
    lowPpm,
    highPpm,
    guardBandPpm: width,
    empty: lowPpm !== null && highPpm !== null && lowPpm > highPpm,
  };
}

/**
 * The worst specific risk a rule takes: the probability that a unit measured exactly on the acceptance limit is
 * nonconforming. 50 % for simple acceptance, 2.3 % for w = U with k = 2, where the limits are far apart.
 * @param coverageFactor k, U = k u
 * @throws StatisticsError as acceptanceLimits, or when U or k is not above zero
 */
export function riskAtAcceptanceLimit(
  limits: Limits,
  rule: DecisionRule,
  expandedUncertaintyPpm: number,
  coverageFactor: number,
): number {
  requirePositive(expandedUncertaintyPpm, 'expandedUncertaintyPpm');
  requirePositive(coverageFactor, 'coverageFactor');
  const { lowPpm, highPpm } = acceptanceLimits(limits, rule, expandedUncertaintyPpm);
  const standardPpm = expandedUncertaintyPpm / coverageFactor;
  const risks = [lowPpm, highPpm]
    .filter((limit) => limit !== null)
    .map((limit) => conformingProbability(limit, standardPpm, limits).nonconforming);
  return Math.max(...risks);
}
