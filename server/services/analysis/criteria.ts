import { type PartCriteria } from '@shared/contract/parts';
import { type ReceiverCriteria } from '@shared/contract/receivers';
import { type SamplingRule } from '@shared/contract/parts';

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
  receivers: {
    receiverId: string;
    revisionId: string;
    name: string;
    revision: string;
    criteria: ReceiverCriteria;
  }[];
  /** The rule that counts for this lot: the part's, or every unit once 100 % inspection is ordered. */
  samplingRule: SamplingRule;
  severity: 'normal' | 'tightened' | 'reduced' | 'discontinued';
  lotSize: number;
  bench: {
    name: string;
    expandedUncertaintyPpm: number;
    coverageFactor: number;
    inCalibration: boolean;
  } | null;
}
