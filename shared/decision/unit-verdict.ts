import { requireFinite } from '../statistics/checks';
import { requireLimits } from './checks';
import { guardBandPpm } from './guard-band';
import { isAbove, isBelow, isBeyond, type DecisionRule, type Limits } from './rule';

export type UnitOutcome = 'conforming' | 'notProven' | 'nonconforming';

export interface UnitVerdict {
  outcome: UnitOutcome;
  /** Is the measured value beyond the limits, uncertainty aside? */
  beyond: boolean;
  /** Does the decision rule take the unit? */
  accepted: boolean;
}

/**
 * What a measured unit is, in three outcomes, and whether the decision rule takes it.
 * Conforming: within the limits by at least the guard band. Nonconforming: beyond them by more than it.
 * Between, neither is proven. A value on a limit, or on the edge of a guard band, lies on the inner side.
 * Simple acceptance has no guard band, hence two outcomes; it takes what is not beyond the limits, guarded
 * acceptance what conforms, guarded rejection all but the nonconforming.
 * @param offsetPpm measured
 * @param expandedUncertaintyPpm U of one reading
 * @throws StatisticsError when the offset is not finite, or the limits or U are out of range
 * Source: ISO 14253-1 (three zones); JCGM 106:2012, 8.2 and 8.3; from memory.
 */
export function unitVerdict(
  offsetPpm: number,
  limits: Limits,
  rule: DecisionRule,
  expandedUncertaintyPpm: number,
): UnitVerdict {
  requireFinite(offsetPpm, 'offsetPpm');
  requireLimits(limits);
  return verdictWithin(offsetPpm, limits, rule, guardBandPpm(rule, expandedUncertaintyPpm));
}

function verdictWithin(
  offsetPpm: number,
  limits: Limits,
  rule: DecisionRule,
  width: number,
): UnitVerdict {
  const { lowPpm, highPpm } = limits;
  const shift = (limit: number | null, by: number) => (limit === null ? null : limit + by);
  const beyond = isBeyond(offsetPpm, limits);
  const nonconforming =
    isBelow(offsetPpm, shift(lowPpm, -width)) || isAbove(offsetPpm, shift(highPpm, width));
  const conforming =
    !isBelow(offsetPpm, shift(lowPpm, width)) && !isAbove(offsetPpm, shift(highPpm, -width));
  const outcome = nonconforming ? 'nonconforming' : conforming ? 'conforming' : 'notProven';
  const accepted =
    rule.kind === 'simple'
      ? !beyond
      : rule.kind === 'guardedAcceptance'
        ? conforming
        : !nonconforming;
  return { outcome, beyond, accepted };
}

export interface VerdictCounts {
  units: number;
  conforming: number;
  /** Not proven, measured within the limits. */
  notProvenInside: number;
  /** Not proven, measured beyond the limits. */
  notProvenOutside: number;
  nonconforming: number;
  /** Measured beyond the limits, uncertainty aside. */
  beyond: number;
  /** Not taken by the decision rule; this is what the sampling plan counts. */
  refused: number;
}

/** The verdicts of a sample, counted. @throws as unitVerdict */
export function countVerdicts(
  offsetsPpm: ArrayLike<number>,
  limits: Limits,
  rule: DecisionRule,
  expandedUncertaintyPpm: number,
): VerdictCounts {
  requireLimits(limits);
  const width = guardBandPpm(rule, expandedUncertaintyPpm);
  const counts: VerdictCounts = {
    units: offsetsPpm.length,
    conforming: 0,
    notProvenInside: 0,
    notProvenOutside: 0,
    nonconforming: 0,
    beyond: 0,
    refused: 0,
  };
  for (let index = 0; index < offsetsPpm.length; index += 1) {
    requireFinite(offsetsPpm[index]!, 'offsetsPpm');
    const { outcome, beyond, accepted } = verdictWithin(offsetsPpm[index]!, limits, rule, width);
    if (outcome === 'notProven') counts[beyond ? 'notProvenOutside' : 'notProvenInside'] += 1;
    else counts[outcome] += 1;
    if (beyond) counts.beyond += 1;
    if (!accepted) counts.refused += 1;
  }
  return counts;
}
