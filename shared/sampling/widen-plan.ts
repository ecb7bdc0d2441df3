import { requireWhole } from '../statistics/checks';
import { binomialCdf } from '../statistics/distributions/binomial';
import { describePlan } from './describe-plan';
import { type SamplingPlan } from './plan';

/**
 * The plan for more units than it asked for, so that measuring more neither punishes nor spares a lot.
 * Attribute plans: the smallest acceptance number whose probability of acceptance at the AQL is not below that of
 * the plan, P(X <= c; m, AQL) >= P(X < Re; n, AQL). Zero acceptance and every unit: unchanged numbers.
 * Variables: k for the units measured is left as fixed beforehand.
 * @param unitsMeasured m; the plan is returned as it is unless m exceeds its sample size
 * @throws StatisticsError when unitsMeasured is not a whole number
 * Source: our own extension of the tables; the tables know only their own sample sizes.
 */
export function widenPlan(plan: SamplingPlan, unitsMeasured: number): SamplingPlan {
  requireWhole(unitsMeasured, 'unitsMeasured');
  if (plan.kind !== 'attribute' || unitsMeasured <= plan.tableSampleSize) return plan;
  const share = plan.aqlPercent / 100;
  const wanted = binomialCdf(plan.rejectionNumber - 1, plan.tableSampleSize, share);
  const acceptanceNumber = leastCount(
    plan.acceptanceNumber,
    unitsMeasured,
    (count) => binomialCdf(count, unitsMeasured, share) >= wanted,
  );
  const widened = {
    ...plan,
    // More units measured than were registered: the lot holds at least those.
    lotSize: Math.max(plan.lotSize, unitsMeasured),
    sampleSize: unitsMeasured,
    acceptanceNumber,
    rejectionNumber: acceptanceNumber + 1,
    everyUnit: unitsMeasured >= plan.lotSize,
  };
  return { ...widened, description: describePlan(widened) };
}

/** The least whole number from `from` to `to` for which a condition holds that stays once it holds; it holds at `to`. */
function leastCount(from: number, to: number, holds: (count: number) => boolean): number {
  let low = from;
  let high = to;
  while (low < high) {
    const middle = Math.floor((low + high) / 2);
    if (holds(middle)) high = middle;
    else low = middle + 1;
  }
  return low;
}
