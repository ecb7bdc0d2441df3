import { requireOpenShare, requireShare } from '../statistics/checks';
import { binomialCdf } from '../statistics/distributions/binomial';
import { hypergeometricCdf } from '../statistics/distributions/hypergeometric';
import { type SamplingPlan } from './plan';
import { variablesAcceptance } from './variables-plan';

export interface CharacteristicPoint {
  percentNonconforming: number;
  acceptanceProbability: number;
}

export interface OperatingCharacteristic {
  points: CharacteristicPoint[];
  /** Percent nonconforming accepted 95, 50 and 10 times in a hundred. */
  producersPercent: number;
  indifferencePercent: number;
  consumersPercent: number;
  /** How the curve was computed, for the page. */
  method: 'hypergeometric' | 'binomial' | 'noncentral t';
}

/** Beyond this part of the lot the sample visibly empties it, and drawing without replacement matters. */
const SMALL_LOT_SHARE = 0.1;

export function characteristicMethod(plan: SamplingPlan): OperatingCharacteristic['method'] {
  if (plan.kind === 'variables') return 'noncentral t';
  const exact = plan.kind === 'zeroAcceptance' || plan.sampleSize > plan.lotSize * SMALL_LOT_SHARE;
  return exact ? 'hypergeometric' : 'binomial';
}

/**
 * Probability that the plan accepts a lot of the given share nonconforming.
 * Attributes: P(found < rejection number), hypergeometric for zero acceptance and for samples above a tenth of the
 * lot (linear between whole units in the lot), else binomial. Variables: noncentral t, one limit, normal lot.
 * Falls from 1 at share 0 without ever rising.
 * @param share in [0, 1]
 * @throws StatisticsError when share is outside [0, 1]
 */
export function acceptanceProbability(plan: SamplingPlan, share: number): number {
  requireShare(share, 'share');
  if (plan.kind === 'variables') return variablesAcceptance(plan.sampleSize, plan.k, share);
  // In reduced inspection a count between the two numbers still accepts the lot.
  const most = plan.rejectionNumber - 1;
  if (characteristicMethod(plan) === 'binomial') return binomialCdf(most, plan.sampleSize, share);
  const units = share * plan.lotSize;
  const below = Math.floor(units);
  const part = units - below;
  const at = (nonconforming: number) =>
    hypergeometricCdf(most, plan.lotSize, nonconforming, plan.sampleSize);
  return part === 0 ? at(below) : (1 - part) * at(below) + part * at(below + 1);
}

/**
 * Share nonconforming at which the plan accepts with the given probability, by bisection of the falling curve.
 * 1 when even a wholly nonconforming lot is accepted more often than that.
 * @throws StatisticsError when the probability is not strictly between 0 and 1
 */
export function shareAccepted(plan: SamplingPlan, probability: number): number {
  requireOpenShare(probability, 'probability');
  let low = 0;
  let high = 1;
  if (acceptanceProbability(plan, 1) >= probability) return 1;
  for (let step = 0; step < 60 && high - low > 1e-12; step += 1) {
    const middle = (low + high) / 2;
    if (acceptanceProbability(plan, middle) >= probability) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/**
 * Operating characteristic curve, from no unit nonconforming to where hardly a lot passes.
 * @param count points, 2 or more
 */
export function operatingCharacteristic(plan: SamplingPlan, count = 81): OperatingCharacteristic {
  const last = Math.min(1, shareAccepted(plan, 0.005) * 1.02);
  const points = Array.from({ length: Math.max(2, count) }, (_, index) => {
    const share = (last * index) / (Math.max(2, count) - 1);
    return {
      percentNonconforming: share * 100,
      acceptanceProbability: acceptanceProbability(plan, share),
    };
  });
  return {
    points,
    producersPercent: shareAccepted(plan, 0.95) * 100,
    indifferencePercent: shareAccepted(plan, 0.5) * 100,
    consumersPercent: shareAccepted(plan, 0.1) * 100,
    method: characteristicMethod(plan),
  };
}
