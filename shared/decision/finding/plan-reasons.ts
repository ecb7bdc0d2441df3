import { count, countOf, opening, spelledCount } from '../../format/counts';
import { formatNumber } from '../../format/number';
import { percent, percentPair } from '../../format/percent';
import { beyondLimits } from '../../format/ppm';
import { expandedUncertainty } from '../../format/uncertainty';
import { planName } from '../../sampling/describe-plan';
import { type SamplingPlan } from '../../sampling/plan';
import { type FindingReason, type LotFindingInput } from './input';

/** What the sample says by the plan, and how near the lot is to it. Assumes at least one unit measured. */
export function planReasons(input: LotFindingInput, plan: SamplingPlan): FindingReason[] {
  const sample =
    plan.kind === 'variables' ? variablesReasons(input, plan) : countReasons(input, plan);
  return [...sample, ...shareReasons(input), ...guardReasons(input, plan)];
}

type CountingPlan = Exclude<SamplingPlan, { kind: 'variables' }>;

/** Units the decision rule does not take: what the plan counts. */
export function refusedUnits({ beyond, guard }: LotFindingInput): number {
  if (guard.rule.kind === 'guardedAcceptance') return beyond.count + guard.notProvenInside;
  if (guard.rule.kind === 'guardedRejection') return beyond.count - guard.notProvenOutside;
  return beyond.count;
}

function countReasons(input: LotFindingInput, plan: CountingPlan): FindingReason[] {
  const { beyond, units, guard } = input;
  const relaxed = guard.rule.kind === 'guardedRejection';
  const counted = relaxed ? refusedUnits(input) : beyond.count;
  const where = relaxed ? `proven to be ${beyondLimits(input.limits)}` : beyondLimits(input.limits);
  const missed = counted >= plan.rejectionNumber;
  const text = `${ofUnits(counted, units.measured)} ${where}; ${allowance(plan)}.`;
  const reasons: FindingReason[] = [{ kind: 'plan', weight: missed ? 'against' : 'for', text }];
  if (!missed && counted > plan.acceptanceNumber)
    reasons.push({
      kind: 'plan',
      weight: 'note',
      text: `That is more than the acceptance number of ${plan.acceptanceNumber}, but fewer than the rejection number of ${plan.rejectionNumber}: the lot passes, and normal inspection returns.`,
    });
  if (units.measured >= units.lotSize && counted > 0)
    reasons.push({
      kind: 'plan',
      weight: 'note',
      text: `Every unit was measured, so the ${spelledCount(counted, 'unit')} found can be taken out of the lot.`,
    });
  return reasons;
}

function allowance(plan: CountingPlan): string {
  const widened = plan.kind === 'attribute' && plan.sampleSize > plan.tableSampleSize;
  const subject = widened
    ? `the plan, carried from ${count(plan.tableSampleSize)} to ${countOf(plan.sampleSize, 'unit')},`
    : 'the plan';
  const accepts =
    plan.acceptanceNumber === 0 && plan.rejectionNumber === 1
      ? 'none'
      : count(plan.acceptanceNumber);
  return `${subject} accepts ${accepts} (${planName(plan)})`;
}

function variablesReasons(
  input: LotFindingInput,
  plan: Extract<SamplingPlan, { kind: 'variables' }>,
): FindingReason[] {
  const verdict = input.variables;
  if (!verdict) return [];
  const { qualityIndex, estimatedShare, largestShare, met } = verdict;
  let decimals = 2;
  const write = (value: number) => formatNumber(value, { decimals });
  while (decimals < 6 && write(qualityIndex) === write(plan.k) && qualityIndex !== plan.k)
    decimals += 1;
  const sides =
    input.limits.lowPpm !== null && input.limits.highPpm !== null
      ? 'The nearer limit'
      : 'The limit';
  const near = qualityIndex >= plan.k;
  const reasons: FindingReason[] = [
    {
      kind: 'plan',
      weight: near ? (met ? 'for' : 'note') : 'against',
      text: `${sides} lies ${write(qualityIndex)} standard deviations from the mean; the plan asks for at least ${write(plan.k)} (${planName(plan)}).`,
    },
  ];
  if (near && !met) {
    const [estimate, largest] = percentPair(estimatedShare, largestShare);
    reasons.push({
      kind: 'plan',
      weight: 'against',
      text: `Both limits together leave an estimated ${estimate} beyond; the plan allows ${largest}.`,
    });
  }
  const found = refusedUnits(input);
  if (found > 0 && input.beyond.count > 0)
    reasons.push({
      kind: 'plan',
      weight: 'note',
      text: `${ofUnits(input.beyond.count, input.units.measured)} ${beyondLimits(input.limits)}, to be taken out; the plan judges mean and spread.`,
    });
  return reasons;
}

function shareReasons({ beyond, units }: LotFindingInput): FindingReason[] {
  if (units.measured >= units.lotSize)
    return [
      {
        kind: 'share',
        weight: 'note',
        text: `Every unit was measured: ${percent(beyond.share)} of the lot is beyond.`,
      },
    ];
  const confidence = percent(beyond.confidence ?? 0.95);
  const estimate =
    beyond.share === 0
      ? 'none was found'
      : `the estimate is ${percentPair(beyond.share, beyond.upperBound)[0]}`;
  return [
    {
      kind: 'share',
      weight: 'note',
      text: `At most ${percentPair(beyond.upperBound, beyond.share)[0]} of the lot is beyond, with ${confidence} confidence; ${estimate}.`,
    },
  ];
}

function guardReasons(input: LotFindingInput, plan: SamplingPlan): FindingReason[] {
  const { guard, beyond, units } = input;
  const width = expandedUncertainty(guard.guardBandPpm, 'ppm');
  const reasons: FindingReason[] = [];
  if (guard.notProvenInside > 0) {
    const found = guard.notProvenInside;
    const lie = `${countOf(found, 'unit')} ${found === 1 ? 'lies' : 'lie'} within the guard band of ${width}: conformity not proven`;
    const refused = refusedUnits(input);
    const decisive =
      guard.rule.kind === 'guardedAcceptance' &&
      plan.kind !== 'variables' &&
      beyond.count < plan.rejectionNumber &&
      refused >= plan.rejectionNumber;
    const tail = decisive
      ? beyond.count > 0
        ? `. With the units beyond, the decision rule refuses ${count(refused)} of ${count(units.measured)}; the plan accepts ${count(plan.acceptanceNumber)}`
        : `. The decision rule refuses them; the plan accepts ${plan.acceptanceNumber === 0 ? 'none' : count(plan.acceptanceNumber)}`
      : '';
    reasons.push({ kind: 'guard', weight: decisive ? 'against' : 'note', text: `${lie}${tail}.` });
  }
  if (guard.notProvenOutside > 0) {
    const found = guard.notProvenOutside;
    const counted = guard.rule.kind === 'guardedRejection' ? ', so not counted' : '';
    reasons.push({
      kind: 'guard',
      weight: 'note',
      text: `${opening(spelledCount(found, 'unit'))} measured beyond the limits ${found === 1 ? 'is' : 'are'} so by no more than the guard band of ${width}: nonconformity not proven${counted}.`,
    });
  }
  return reasons;
}

/** '3 of 200 units are', '1 of 200 units is', 'None of 200 units is'. */
function ofUnits(found: number, measured: number): string {
  const whole = countOf(measured, 'unit');
  if (found === 0) return `None of ${whole} is`;
  return `${count(found)} of ${whole} ${found === 1 ? 'is' : 'are'}`;
}
