import { type z } from 'zod';
import { type OwedItem } from '@shared/contract/lots';
import { countOf } from '@shared/format/counts';

export interface OwedFacts {
  unitsPlanned: number;
  unitsMeasured: number;
  hasAnalysis: boolean;
  uploadsRunning: number;
  openWarnings: number;
  criteriaApproved: boolean;
  benchOutOfCalibration: string | null;
  /** An upload that counts names no bench, so nothing is known of its calibration. */
  benchUnknown: boolean;
  requireBenchInCalibration: boolean;
  /** Sampled units that lack a reading at one of the required temperatures. */
  unitsLackingTemperatures: number;
  requiredTemperaturesC: number[];
  /** Units without a resistance, where the part limits it. */
  unitsLackingResistance: number;
  discontinued: boolean;
}

/** What stands between a lot and acceptance, in sentences. Nothing is accepted while this is not empty, except under concession. */
export function owedItems(facts: OwedFacts): z.infer<typeof OwedItem>[] {
  const owed: z.infer<typeof OwedItem>[] = [];
  const missing = facts.unitsPlanned - facts.unitsMeasured;
  if (missing > 0)
    owed.push({
      kind: 'units',
      text: `${countOf(missing, 'unit')} still to be measured: ${facts.unitsMeasured} of ${facts.unitsPlanned} done.`,
    });
  if (facts.unitsLackingTemperatures > 0) {
    owed.push({
      kind: 'temperatures',
      text: `${countOf(facts.unitsLackingTemperatures, 'unit')} not yet read at every required temperature (${facts.requiredTemperaturesC.join(', ')} °C).`,
    });
  }
  if (facts.unitsLackingResistance > 0)
    owed.push({
      kind: 'characteristics',
      text: `${countOf(facts.unitsLackingResistance, 'unit')} not yet read for resistance, which the part limits.`,
    });
  if (facts.uploadsRunning > 0)
    owed.push({
      kind: 'uploads_running',
      text: `${countOf(facts.uploadsRunning, 'upload')} still being read.`,
    });
  if (!facts.hasAnalysis && facts.uploadsRunning === 0)
    owed.push({ kind: 'analysis', text: 'No analysis yet: upload readings first.' });
  if (facts.openWarnings > 0)
    owed.push({
      kind: 'warnings',
      text: `${countOf(facts.openWarnings, 'warning')} of uploads not cleared yet.`,
    });
  if (!facts.criteriaApproved)
    owed.push({
      kind: 'criteria',
      text: 'The criteria are a draft: a quality engineer has to approve the part and receiver revisions.',
    });
  if (facts.requireBenchInCalibration && facts.benchOutOfCalibration) {
    owed.push({
      kind: 'bench',
      text: `${facts.benchOutOfCalibration} was out of calibration when it measured.`,
    });
  }
  if (facts.requireBenchInCalibration && facts.benchUnknown) {
    owed.push({
      kind: 'bench',
      text: 'An upload names no bench, so its calibration is not known: withdraw it and upload it with its bench.',
    });
  }
  if (facts.discontinued)
    owed.push({
      kind: 'discontinued',
      text: 'Sampling inspection of this part from this supplier is discontinued until corrective action is agreed.',
    });
  return owed;
}
