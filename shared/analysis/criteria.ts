import { type DecisionRule, type PartCriteria, type SamplingRule } from '../contract/parts';
import { type ReceiverCriteria } from '../contract/receivers';
import { type InspectionState } from '../sampling/switching';

export interface JudgingReceiver {
  receiverId: string;
  revisionId: string;
  name: string;
  revision: string;
  criteria: ReceiverCriteria;
}

/** The bench of a lot's readings; of several, the least certain one, so that no result looks better than it is. */
export interface JudgingBench {
  name: string;
  expandedUncertaintyPpm: number;
  coverageFactor: number;
  calibrationDue: string;
  inCalibration: boolean;
}

/** Everything a lot is judged by, as it stood when the analysis was made. Hashed, so that nothing can be exchanged later. */
export interface AnalysisCriteria {
  part: {
    id: string;
    partNumber: string;
    revisionId: string;
    revision: string;
    effectiveFrom: string | null;
    criteria: PartCriteria;
  };
  receivers: JudgingReceiver[];
  /** The rule that counts for this lot: the part's, or every unit once 100 % inspection is ordered. */
  samplingRule: SamplingRule;
  severity: InspectionState;
  lotSize: number;
  bench: JudgingBench | null;
}

export type { DecisionRule };
