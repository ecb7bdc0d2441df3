import { type DecisionRule, type PartCriteria, type SamplingRule } from '@shared/contract/parts';
import { hertz, reading } from '@shared/format/hertz';
import { formatNumber } from '@shared/format/number';
import { percentAsSet } from '@shared/format/percent';
import { limitsPpm, ppm } from '@shared/format/ppm';
import { type CriterionRow } from '@/components/criteria/criterion-row';

type Translate = (key: string, values?: Record<string, unknown>) => string;

const withUnit = (value: number | null, unit: string) =>
  value === null ? '' : `${formatNumber(value, { significant: 8 })}\u00a0${unit}`;
const plusMinus = (value: number | null) => (value === null ? '' : `±${ppm(value)}`);

/** Whole hertz in the usual multiples, anything finer with every digit. */
export function nominalText(nominalFrequencyHz: string): string {
  const whole = Number(nominalFrequencyHz);
  return /^\d+$/.test(nominalFrequencyHz) && Number.isSafeInteger(whole)
    ? hertz(whole, { significant: 12 })
    : reading(nominalFrequencyHz);
}

export function samplingRuleText(rule: SamplingRule, t: Translate): string {
  const said = (values: Record<string, unknown>) => t(`parts.sampling.said.${rule.kind}`, values);
  switch (rule.kind) {
    case 'attribute':
    case 'variables':
      return said({ level: rule.level, aql: percentAsSet(rule.aqlPercent) });
    case 'zeroAcceptance':
      return said({
        quality: percentAsSet(rule.limitingQualityPercent),
        risk: percentAsSet(100 * rule.consumersRisk),
      });
    case 'everyUnit':
      return said({ allowed: rule.allowedNonconforming });
  }
}

export function decisionRuleText(rule: DecisionRule, t: Translate): string {
  return t(`parts.decision.said.${rule.kind}`, {
    factor: rule.kind === 'simple' ? '' : formatNumber(rule.factor),
  });
}

/** A part's criteria in words, every one of them, in the order of the form. */
export function partCriteriaRows(c: PartCriteria, t: Translate): CriterionRow[] {
  const row = (key: string, value: string) => ({ key, label: t(`parts.criterion.${key}`), value });
  const celsius = (value: number | null) => withUnit(value, '°C');
  return [
    row('nominalFrequencyHz', nominalText(c.nominalFrequencyHz)),
    row('limits', limitsPpm({ lowPpm: c.toleranceLowPpm, highPpm: c.toleranceHighPpm })),
    row('referenceTemperatureC', celsius(c.referenceTemperatureC)),
    row('stabilityPpm', plusMinus(c.stabilityPpm)),
    row(
      'stabilityReference',
      c.stabilityPpm === null
        ? ''
        : t(`parts.criterion.stabilityReferences.${c.stabilityReference}`),
    ),
    row(
      'temperatureRange',
      c.temperatureLowC === null || c.temperatureHighC === null
        ? ''
        : `${formatNumber(c.temperatureLowC)} to ${celsius(c.temperatureHighC)}`,
    ),
    row('ageingFirstYearPpm', plusMinus(c.ageingFirstYearPpm)),
    row('ageingTenYearsPpm', plusMinus(c.ageingTenYearsPpm)),
    row('supplyPpm', plusMinus(c.supplyPpm)),
    row('loadPpm', plusMinus(c.loadPpm)),
    row('loadCapacitancePf', withUnit(c.loadCapacitancePf, 'pF')),
    row('motionalCapacitanceFf', withUnit(c.motionalCapacitanceFf, 'fF')),
    row('shuntCapacitancePf', withUnit(c.shuntCapacitancePf, 'pF')),
    row('greatestResistanceOhm', withUnit(c.greatestResistanceOhm, 'Ω')),
    row('samplingRule', samplingRuleText(c.samplingRule, t)),
    row('decisionRule', decisionRuleText(c.decisionRule, t)),
    row('repeatReadings', t(`parts.criterion.repeat.${c.repeatReadings}`)),
    row('requiredTemperaturesC', c.requiredTemperaturesC.map(celsius).join(', ')),
    row(
      'requireBenchInCalibration',
      t(`parts.criterion.${c.requireBenchInCalibration ? 'yes' : 'no'}`),
    ),
  ];
}
