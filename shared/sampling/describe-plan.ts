import { countOf } from '../format/counts';
import { formatNumber } from '../format/number';
import { percent, percentAsSet } from '../format/percent';
import { type WordlessPlan } from './plan';

/** A plan in one line: "letter L, AQL 0.25 %, 200 units, accept on 1, reject on 2". */
export function describePlan(plan: WordlessPlan): string {
  return [planName(plan), sampleWords(plan), criterion(plan)].join(', ');
}

/** What names the plan in a sentence: "letter L, AQL 0.25 %", with the severity when it is not normal. */
export function planName(plan: WordlessPlan): string {
  const severity = plan.severity === 'normal' ? '' : `, ${plan.severity} inspection`;
  switch (plan.kind) {
    case 'attribute':
      return `letter ${plan.codeLetter}, AQL ${percentAsSet(plan.aqlPercent)}${severity}`;
    case 'variables':
      return `variables, letter ${plan.codeLetter}, AQL ${percentAsSet(plan.aqlPercent)}${severity}`;
    case 'zeroAcceptance':
      return `zero acceptance, limiting quality ${percentAsSet(plan.limitingQualityPercent)} at ${percent(plan.consumersRisk)} consumer’s risk`;
    case 'everyUnit':
      return '100\u00a0% inspection';
  }
}

function sampleWords(plan: WordlessPlan): string {
  const units = countOf(plan.sampleSize, 'unit');
  return plan.everyUnit && plan.kind !== 'everyUnit' ? `all ${units} of the lot` : units;
}

function criterion(plan: WordlessPlan): string {
  if (plan.kind === 'variables')
    return `accept when the limits lie at least k = ${formatNumber(plan.k, { decimals: 3 })} standard deviations from the mean`;
  return `accept on ${plan.acceptanceNumber}, reject on ${plan.rejectionNumber}`;
}
