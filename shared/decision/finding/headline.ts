import { count } from '../../format/counts';
import { type SamplingPlan } from '../../sampling/plan';
import { type FindingReason, type LotFindingInput, type ReasonKind } from './input';

/** The finding in one or two sentences, led by what weighs most. */
export function headline(
  input: LotFindingInput,
  plan: SamplingPlan,
  reasons: readonly FindingReason[],
): string {
  const against = reasons.filter(({ weight }) => weight === 'against');
  if (against.length === 0) return acceptHeadline(input);
  return `Hold. ${holdSentence(input, plan, new Set(against.map(({ kind }) => kind)))}`;
}

function acceptHeadline({ links, plan, units }: LotFindingInput): string {
  const subject = units.measured >= units.lotSize ? 'The lot' : 'The sample';
  const meets =
    plan.kind === 'everyUnit' ? 'The lot meets its criteria' : `${subject} meets the plan`;
  return links === null
    ? `Accept. ${meets}; no receiver is named for this part.`
    : `Accept. ${meets}, and links would work.`;
}

function holdSentence(
  input: LotFindingInput,
  plan: SamplingPlan,
  against: ReadonlySet<ReasonKind>,
): string {
  const { units, links } = input;
  if (units.measured === 0) return 'No unit has been measured yet.';
  const subject = units.measured >= units.lotSize ? 'The lot' : 'The sample';
  if (against.has('plan')) return `${planTrouble(plan, subject)}${linkClause(input, against)}.`;
  if (against.has('guard'))
    return `Too many units are not proven to conform${linkClause(input, against)}.`;
  if (against.has('inspection'))
    return 'Acceptance of this part from this supplier is discontinued.';
  if (against.has('units')) {
    const owed = plan.sampleSize - units.measured;
    const rest = `${count(owed)} of the ${count(plan.sampleSize)} units owed ${owed === 1 ? 'is' : 'are'} still to be measured`;
    return against.has('links')
      ? `${opened(rest)}, and those measured do not show that links would work.`
      : `${opened(rest)}.`;
  }
  if (against.has('links'))
    return links !== null && links.shareOutside > links.allowedShare
      ? `${subject} meets the plan, but too many links would leave the symbol-rate region.`
      : `${subject} meets the plan, but does not show that links would work.`;
  if (against.has('bench'))
    return `${subject} meets the plan, but the bench does not carry the decision.`;
  return `${subject} meets the plan, but the lot is not the single normal lot that the plan presumes.`;
}

function planTrouble(plan: SamplingPlan, subject: string): string {
  if (plan.kind === 'variables') return `${subject} lies closer to its limits than the plan allows`;
  const limit = plan.kind === 'everyUnit' ? 'than the rule allows' : 'than the plan allows';
  return `${subject} has more units beyond the limits ${limit}`;
}

function linkClause({ links }: LotFindingInput, against: ReadonlySet<ReasonKind>): string {
  if (links === null) return '';
  if (!against.has('links')) return ', though links would still work';
  return links.shareOutside > links.allowedShare
    ? ', and too many links would leave the symbol-rate region'
    : ', and links are not shown to work';
}

const opened = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);
