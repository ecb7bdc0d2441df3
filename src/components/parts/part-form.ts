import { PartCriteriaFields, type PartCriteria, type SamplingRule } from '@shared/contract/parts';
import { type BodyInput } from '@shared/contract/endpoint';
import type * as contract from '@shared/contract/parts';
import {
  fieldsOfIssues,
  fromPercent,
  toPercent,
  type FormValues,
} from '@/components/criteria/form-values';

type Plain = Omit<PartCriteria, 'samplingRule' | 'decisionRule'>;

/** Criteria as a form holds them: rules laid flat, so that changing one's mind loses nothing. */
export interface PartCriteriaValues extends FormValues<Plain> {
  samplingKind: SamplingRule['kind'];
  level: 'I' | 'II' | 'III' | 'S-1' | 'S-2' | 'S-3' | 'S-4';
  aqlPercent: number;
  limitingQualityPercent: number | null;
  consumersRiskPercent: number | null;
  allowedNonconforming: number | null;
  decisionKind: PartCriteria['decisionRule']['kind'];
  guardFactor: number | null;
}

/** Names that the form gives to what the contract holds nested. */
export const renamed = { consumersRisk: 'consumersRiskPercent', factor: 'guardFactor' };

export function emptyCriteria(): PartCriteriaValues {
  return {
    nominalFrequencyHz: '',
    toleranceLowPpm: null,
    toleranceHighPpm: null,
    referenceTemperatureC: 25,
    stabilityPpm: null,
    stabilityReference: 'reference_temperature',
    temperatureLowC: null,
    temperatureHighC: null,
    ageingFirstYearPpm: null,
    ageingTenYearsPpm: null,
    supplyPpm: 0,
    loadPpm: 0,
    loadCapacitancePf: null,
    motionalCapacitanceFf: null,
    shuntCapacitancePf: null,
    greatestResistanceOhm: null,
    repeatReadings: 'refuse',
    requiredTemperaturesC: [],
    requireBenchInCalibration: true,
    samplingKind: 'attribute',
    level: 'II',
    aqlPercent: 0.25,
    limitingQualityPercent: 1,
    consumersRiskPercent: 10,
    allowedNonconforming: 0,
    decisionKind: 'guardedAcceptance',
    guardFactor: 1,
  };
}

export function valuesOf({
  samplingRule,
  decisionRule,
  ...plain
}: PartCriteria): PartCriteriaValues {
  const values = { ...emptyCriteria(), ...plain, samplingKind: samplingRule.kind };
  if ('aqlPercent' in samplingRule)
    Object.assign(values, { level: samplingRule.level, aqlPercent: samplingRule.aqlPercent });
  else if (samplingRule.kind === 'zeroAcceptance')
    Object.assign(values, {
      limitingQualityPercent: samplingRule.limitingQualityPercent,
      consumersRiskPercent: toPercent(samplingRule.consumersRisk),
    });
  else values.allowedNonconforming = samplingRule.allowedNonconforming;
  values.decisionKind = decisionRule.kind;
  if (decisionRule.kind !== 'simple') values.guardFactor = decisionRule.factor;
  return values;
}

/** Not yet checked: numbers may still be missing. */
export function samplingRuleOf(values: PartCriteriaValues): unknown {
  const { samplingKind: kind, level, aqlPercent } = values;
  switch (kind) {
    case 'attribute':
    case 'variables':
      return { kind, level, aqlPercent };
    case 'zeroAcceptance':
      return {
        kind,
        limitingQualityPercent: values.limitingQualityPercent,
        consumersRisk: fromPercent(values.consumersRiskPercent),
      };
    case 'everyUnit':
      return { kind, allowedNonconforming: values.allowedNonconforming };
  }
}

/** The criteria of a form's values; checked by the contract before they are sent. */
export function criteriaOf(values: PartCriteriaValues): PartCriteria {
  const plain = Object.fromEntries(
    plainFields.map((field) => [field, values[field]]),
  ) as unknown as Plain;
  return {
    ...plain,
    samplingRule: samplingRuleOf(values) as SamplingRule,
    decisionRule:
      values.decisionKind === 'simple'
        ? { kind: 'simple' }
        : { kind: values.decisionKind, factor: values.guardFactor as number },
  };
}

const plainFields = Object.keys(emptyCriteria()).filter(
  (key) =>
    ![
      'samplingKind',
      'level',
      'aqlPercent',
      'limitingQualityPercent',
      'consumersRiskPercent',
      'allowedNonconforming',
      'decisionKind',
      'guardFactor',
    ].includes(key),
) as (keyof Plain)[];

type Translate = (key: string, values?: Record<string, unknown>) => string;

export function criteriaErrors(values: PartCriteriaValues, t: Translate): Record<string, string> {
  const { error } = PartCriteriaFields.safeParse(criteriaOf(values));
  return fieldsOfIssues(error?.issues ?? [], t, renamed);
}

export type PartBody = BodyInput<typeof contract.addPart>;
