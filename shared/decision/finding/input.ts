import { type InspectionState } from '../../sampling/switching';
import { type SamplingPlan } from '../../sampling/plan';
import { type DecisionRule, type Limits } from '../rule';

/** What the analysis hands over: plain numbers, gathered once. Shares are 0 to 1, offsets in ppm. */
export interface LotFindingInput {
  units: {
    measured: number;
    lotSize: number;
  };
  limits: Limits;
  /** Units measured beyond the limits, with the share estimated and its one-sided exact upper bound. */
  beyond: { count: number; share: number; upperBound: number; confidence?: number };
  guard: {
    rule: DecisionRule;
    guardBandPpm: number;
    /** Conformity not proven: measured within the limits, and beyond them. */
    notProvenInside: number;
    notProvenOutside: number;
  };
  /** As planFor gave it; more units than it asks for are allowed for here. */
  plan: SamplingPlan;
  /** The variables criterion of the sample; needed when the plan is one by variables. */
  variables?: {
    qualityIndex: number;
    estimatedShare: number;
    largestShare: number;
    met: boolean;
  } | null;
  /** The receiver with the strictest case; null when the part names none. */
  links: WorstLinks | null;
  /** Anderson-Darling of the body of the lot, outliers aside; null when there were too few units. */
  normality: { a2: number; p: number } | null;
  outliers: number;
  /** Centres of the groups when the offsets fall into more than one; null or empty when they do not. */
  clusterCentresPpm?: readonly number[] | null;
  bench: FindingBench | null;
  refusedRows: number;
  /** State of the switching rules for this part and supplier; normal when not given. */
  inspectionState?: InspectionState;
}

export interface WorstLinks {
  receiverName: string;
  /** Share of links outside the symbol-rate region, with its upper bound and what the receiver allows. */
  shareOutside: number;
  upperBound: number;
  allowedShare: number;
}

export interface FindingBench {
  name: string;
  expandedUncertaintyPpm: number;
  /** Day the calibration is or was due, 'YYYY-MM-DD'. */
  calibrationDue: string;
  inCalibration: boolean;
  /** Does the part ask for a bench in calibration? Default true. */
  calibrationRequired?: boolean;
}

export type ReasonKind =
  | 'plan'
  | 'share'
  | 'guard'
  | 'links'
  | 'units'
  | 'bench'
  | 'normality'
  | 'outliers'
  | 'clusters'
  | 'rows'
  | 'inspection';

export interface FindingReason {
  kind: ReasonKind;
  /** 'against' alone holds the lot. */
  weight: 'against' | 'for' | 'note';
  text: string;
}

export interface LotFinding {
  decision: 'accept' | 'hold';
  headline: string;
  /** Those against first. */
  reasons: FindingReason[];
}
