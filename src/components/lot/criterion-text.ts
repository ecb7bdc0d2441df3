import { formatNumber } from '@shared/format/number';
import { percentAsSet } from '@shared/format/percent';
import { type DecisionRule, type PartCriteria, type SamplingRule } from '@shared/contract/parts';

type Translate = (key: string, values?: Record<string, unknown>) => string;

/** A criterion's value in words, for comparing revisions. */
export function criterionText(value: PartCriteria[keyof PartCriteria], t: Translate): string {
  if (value === null || value === undefined) return t('lots.lot.field.none');
  if (typeof value === 'boolean') return t(value ? 'lots.lot.field.yes' : 'lots.lot.field.no');
  if (typeof value === 'number') return formatNumber(value, { significant: 8 });
  if (Array.isArray(value))
    return value.length === 0
      ? t('lots.lot.field.none')
      : value.map((one) => formatNumber(one)).join(', ');
  if (typeof value === 'object') return ruleText(value, t);
  return /^[a-z_]+$/.test(value) ? t(`lots.lot.field.value.${value}`) : value;
}

function ruleText(rule: SamplingRule | DecisionRule, t: Translate): string {
  switch (rule.kind) {
    case 'attribute':
    case 'variables':
      return t(`lots.lot.field.rule.${rule.kind}`, {
        level: rule.level,
        aql: percentAsSet(rule.aqlPercent),
      });
    case 'zeroAcceptance':
      return t('lots.lot.field.rule.zeroAcceptance', {
        quality: percentAsSet(rule.limitingQualityPercent),
        risk: percentAsSet(100 * rule.consumersRisk),
      });
    case 'everyUnit':
      return t('lots.lot.field.rule.everyUnit', { allowed: rule.allowedNonconforming });
    case 'simple':
      return t('lots.lot.field.rule.simple');
    default:
      return t(`lots.lot.field.rule.${rule.kind}`, { factor: formatNumber(rule.factor) });
  }
}
