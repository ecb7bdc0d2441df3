import { type Analysis as AnalysisView, type AnalysisResult } from '@shared/contract/analysis';
import { type Analysis, type Lot } from '../models';

/** The stored text is the record; it goes out as it was frozen, with its identity and hashes around it. */
export function presentAnalysis(
  analysis: Analysis,
  lot: Pick<Lot, 'currentAnalysisId'>,
): AnalysisView {
  const result = JSON.parse(analysis.resultText) as AnalysisResult;
  const { part, receivers, bench } = analysis.criteria;
  return {
    ...result,
    id: analysis.id,
    lotId: analysis.lotId,
    version: analysis.version,
    createdAt: analysis.createdAt.toISOString(),
    frozenAt: analysis.frozenAt?.toISOString() ?? null,
    superseded: analysis.id !== lot.currentAnalysisId,
    inputHash: analysis.inputHash,
    criteriaHash: analysis.criteriaHash,
    resultHash: analysis.resultHash,
    criteria: {
      partNumber: part.partNumber,
      partRevision: part.revision,
      effectiveFrom: part.effectiveFrom,
      receivers: receivers.map(({ name, revision }) => ({ name, revision })),
      bench: bench?.name ?? null,
    },
  };
}
