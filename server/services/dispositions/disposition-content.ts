import { type Decision, type SignDisposition } from '@shared/contract/dispositions';
import { type AnalysisResult } from '@shared/contract/analysis';
import { type Transaction } from 'sequelize';
import { type Analysis, type Lot, Part, Supplier } from '../../models';

/** What a signature says, in words. */
export const meanings: Record<Decision, string> = {
  accept: 'acceptance of the lot',
  hold: 'hold of the lot',
  accept_under_concession: 'acceptance under concession, first signature',
  reject: 'rejection of the lot',
  inspect_all: 'order of 100 % inspection',
};

/** Everything the signer saw and decided: lot, readings, criteria, result and decision are bound together by one hash. */
export async function dispositionContent(
  transaction: Transaction,
  lot: Lot,
  analysis: Analysis,
  input: Omit<SignDisposition, 'password'>,
) {
  const result = JSON.parse(analysis.resultText) as AnalysisResult;
  const supplier = await Supplier.findByPk(lot.supplierId, { transaction });
  const part = await Part.findByPk(lot.partId, { transaction });
  return {
    lot: {
      id: lot.id,
      lotNumber: lot.lotNumber,
      lotSize: lot.lotSize,
      dateCode: lot.dateCode,
      purchaseOrder: lot.purchaseOrder,
      receivedOn: lot.receivedOn,
      dataVersion: lot.dataVersion,
    },
    supplierName: supplier?.name ?? '',
    deviceKind: part?.deviceKind ?? '',
    decision: input.decision,
    reason: input.reason,
    treatment: input.treatment ?? null,
    concession: input.concession ?? null,
    correction: input.correction ?? '',
    analysis: {
      id: analysis.id,
      version: analysis.version,
      methodVersion: analysis.methodVersion,
      inputHash: analysis.inputHash,
      criteriaHash: analysis.criteriaHash,
      resultHash: analysis.resultHash,
    },
    seen: {
      headline: result.finding.headline,
      reasons: result.finding.reasons.map((reason) => reason.text),
      units: result.units,
      beyondLimits: result.beyond.limits,
      plan: result.sampling.text,
      decisionRule: result.guardBand.text,
      caution: 'Results support, and do not replace, the contract and qualified judgement.',
    },
  };
}
