import { formatNumber } from '../format/number';
import { percent } from '../format/percent';
import { type SamplingPlan } from './plan';

/** Where a plan's figures come from and what was recomputed, for the page and the report. */
export function planSource(plan: SamplingPlan): string {
  switch (plan.kind) {
    case 'attribute': {
      const table =
        'MIL-STD-105E (1989), tables I and II, public domain, equal in use to ISO 2859-1; recalled from the standard and checked for consistency.';
      const widened = plan.sampleSize > plan.tableSampleSize;
      return widened
        ? `${table} The acceptance number for more units than the table asks is our own: the smallest that accepts a lot at the AQL no less often.`
        : table;
    }
    case 'variables': {
      const { matched, standard } = plan;
      const computed = `k is recomputed from the noncentral t distribution, so that a lot at the AQL passes as often as with ${matched.sampleSize} units by attributes (${percent(matched.acceptanceProbabilityAtAql, { decimals: 1 })}).`;
      if (standard === null)
        return `${computed} The k of MIL-STD-414 for this plan is not on record here.`;
      const difference = formatNumber(standard.difference, { decimals: 3, sign: 'always' });
      return `${computed} MIL-STD-414 (1957), table B-1, from memory, gives ${formatNumber(standard.k, { decimals: 2 })}; the difference is ${difference}.`;
    }
    case 'zeroAcceptance':
      return 'Sample size computed exactly from lot size, limiting quality and consumer’s risk with the hypergeometric distribution.';
    case 'everyUnit':
      return 'Every unit of the lot is measured; nothing is estimated.';
  }
}
