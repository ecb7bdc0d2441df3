import { requireFinite } from '../statistics/checks';
import { requireLimits } from './checks';
import { guardBandPpm } from './guard-band';
import { isBeyond, ON_LIMIT_PPM, type DecisionRule, type Limits } from './rule';

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
  const beyond = isBeyond(offsetPpm, limits);
  const outcome = isBeyond(offsetPpm, moved(limits, width))
    ? 'nonconforming'
    : isBeyond(offsetPpm, moved(limits, -width))
      ? 'notProven'
      : 'conforming';
  return { outcome, beyond, accepted: taken(rule, outcome, beyond) };
}

/** The limits let out by so much on each side; drawn in when it is below zero. */
function moved({ lowPpm, highPpm }: Limits, outward: number): Limits {
  return {
    lowPpm: lowPpm === null ? null : lowPpm - outward,
    highPpm: highPpm === null ? null : highPpm + outward,
  };
}

function taken(rule: DecisionRule, outcome: UnitOutcome, beyond: boolean): boolean {
  if (rule.kind === 'simple') return !beyond;
  return rule.kind === 'guardedAcceptance' ? outcome === 'conforming' : outcome !== 'nonconforming';
}

/** What isBeyond compares with, worked out once for a whole lot. */
function edges({ lowPpm, highPpm }: Limits): { low: number; high: number } {
  return {
    low: lowPpm === null ? -Infinity : lowPpm - ON_LIMIT_PPM,
    high: highPpm === null ? Infinity : highPpm + ON_LIMIT_PPM,
  };
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
  const given = edges(limits);
  const outer = edges(moved(limits, width));
  const inner = edges(moved(limits, -width));
  let [beyond, nonconforming, notConforming, notProvenOutside] = [0, 0, 0, 0];
  // Plain numbers and no object for each unit: a lot may hold a million.
  for (let index = 0; index < offsetsPpm.length; index += 1) {
    const offsetPpm = offsetsPpm[index]!;
    if (!Number.isFinite(offsetPpm)) requireFinite(offsetPpm, 'offsetsPpm');
    const isOut = offsetPpm < given.low || offsetPpm > given.high;
    const isProven = offsetPpm < outer.low || offsetPpm > outer.high;
    if (isOut) beyond += 1;
    if (isProven) nonconforming += 1;
    else if (isOut) notProvenOutside += 1;
    if (isProven || offsetPpm < inner.low || offsetPpm > inner.high) notConforming += 1;
  }
  const units = offsetsPpm.length;
  const refused = {
    simple: beyond,
    guardedAcceptance: notConforming,
    guardedRejection: nonconforming,
  }[rule.kind];
  return {
    units,
    conforming: units - notConforming,
    notProvenInside: notConforming - nonconforming - notProvenOutside,
    notProvenOutside,
    nonconforming,
    beyond,
    refused,
  };
}
