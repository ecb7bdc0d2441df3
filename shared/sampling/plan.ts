import { requireWhole } from '../statistics/checks';
import { attributePlanForLot } from './attribute-plan';
import { codeLetterFor } from './code-letter';
import { describePlan } from './describe-plan';
import { type CodeLetter, type InspectionLevel, type SamplingRule, type Severity } from './rule';
import { variablesPlanForLetter, type VariablesTablePlan } from './variables-plan';
import { zeroAcceptanceSample } from './zero-acceptance';

interface PlanBase {
  severity: Severity;
  lotSize: number;
  sampleSize: number;
  /** The sample is the lot: 100 % inspection. */
  everyUnit: boolean;
  /** The plan in one line, such as "letter L, AQL 0.25 %, 200 units, accept on 1, reject on 2". */
  description: string;
}

export interface AttributePlan extends PlanBase {
  kind: 'attribute';
  level: InspectionLevel;
  aqlPercent: number;
  /** Letter of the plan used; differs from the lot's own letter where an arrow was followed. */
  codeLetter: CodeLetter;
  lotCodeLetter: CodeLetter;
  acceptanceNumber: number;
  rejectionNumber: number;
  /** Sample size the acceptance number was made for, before it was cut to the lot or widened to what was measured. */
  tableSampleSize: number;
}

export interface ZeroAcceptancePlan extends PlanBase {
  kind: 'zeroAcceptance';
  limitingQualityPercent: number;
  consumersRisk: number;
  consumersRiskReached: number;
  acceptanceNumber: 0;
  rejectionNumber: 1;
}

export interface VariablesPlan extends PlanBase {
  kind: 'variables';
  level: InspectionLevel;
  aqlPercent: number;
  codeLetter: CodeLetter;
  lotCodeLetter: CodeLetter;
  k: number;
  matched: VariablesTablePlan['matched'];
  standard: VariablesTablePlan['standard'];
}

export interface EveryUnitPlan extends PlanBase {
  kind: 'everyUnit';
  acceptanceNumber: number;
  rejectionNumber: number;
}

export type SamplingPlan = AttributePlan | ZeroAcceptancePlan | VariablesPlan | EveryUnitPlan;

/**
 * The plan that a rule, fixed beforehand, gives for a lot. Plain data, fit for freezing with the analysis.
 * A sample that reaches the lot size means 100 % inspection: an attribute plan keeps its numbers, a variables plan
 * gives way to counting every unit.
 * @param lotSize units, 1 or more
 * @param severity as the switching rules say; zero-acceptance and every-unit rules know only one
 * @throws StatisticsError naming the argument out of range
 */
export function planFor(
  rule: SamplingRule,
  lotSize: number,
  severity: Severity = 'normal',
): SamplingPlan {
  requireWhole(lotSize, 'lotSize', 1);
  const plan = planWithoutWords(rule, lotSize, severity);
  return { ...plan, description: describePlan(plan) } as SamplingPlan;
}

type Wordless<Plan> = Plan extends SamplingPlan ? Omit<Plan, 'description'> : never;
export type WordlessPlan = Wordless<SamplingPlan>;

function planWithoutWords(rule: SamplingRule, lotSize: number, severity: Severity): WordlessPlan {
  switch (rule.kind) {
    case 'attribute': {
      const { level, aqlPercent } = rule;
      const { sampleSize, ...table } = attributePlanForLot(lotSize, level, aqlPercent, severity);
      const everyUnit = sampleSize >= lotSize;
      return {
        kind: 'attribute',
        severity,
        lotSize,
        level,
        aqlPercent,
        ...table,
        lotCodeLetter: codeLetterFor(lotSize, level),
        sampleSize: everyUnit ? lotSize : sampleSize,
        tableSampleSize: sampleSize,
        everyUnit,
      };
    }
    case 'zeroAcceptance': {
      const { limitingQualityPercent, consumersRisk } = rule;
      const { sampleSize, consumersRiskReached } = zeroAcceptanceSample(
        lotSize,
        limitingQualityPercent / 100,
        consumersRisk,
      );
      return {
        kind: 'zeroAcceptance',
        severity: 'normal',
        lotSize,
        limitingQualityPercent,
        consumersRisk,
        consumersRiskReached,
        sampleSize,
        acceptanceNumber: 0,
        rejectionNumber: 1,
        everyUnit: sampleSize >= lotSize,
      };
    }
    case 'variables': {
      const { level, aqlPercent } = rule;
      const lotCodeLetter = codeLetterFor(lotSize, level);
      const table = variablesPlanForLetter(lotCodeLetter, aqlPercent, severity);
      if (table.sampleSize >= lotSize) return everyUnitPlan(lotSize, 0, severity);
      return {
        kind: 'variables',
        severity,
        lotSize,
        level,
        aqlPercent,
        lotCodeLetter,
        ...table,
        everyUnit: false,
      };
    }
    case 'everyUnit':
      requireWhole(rule.allowedNonconforming, 'allowedNonconforming', 0);
      return everyUnitPlan(lotSize, rule.allowedNonconforming, 'normal');
  }
}

function everyUnitPlan(
  lotSize: number,
  acceptanceNumber: number,
  severity: Severity,
): WordlessPlan {
  return {
    kind: 'everyUnit',
    severity,
    lotSize,
    sampleSize: lotSize,
    acceptanceNumber,
    rejectionNumber: acceptanceNumber + 1,
    everyUnit: true,
  };
}
