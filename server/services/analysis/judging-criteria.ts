import { type Transaction } from 'sequelize';
import { type AnalysisCriteria, type JudgingBench } from '@shared/analysis/criteria';
import { type SamplingRule } from '@shared/contract/parts';
import {
  Bench,
  type Lot,
  Part,
  PartRevision,
  Receiver,
  ReceiverRevision,
  LotReceiver,
  Upload,
} from '../../models';

/** Everything the lot is judged by, as it stands in this transaction; sorted, so that equal criteria have equal hashes. */
export async function judgingCriteria(
  transaction: Transaction,
  lot: Lot,
): Promise<AnalysisCriteria> {
  const revision = (await PartRevision.findByPk(lot.partRevisionId, { transaction }))!;
  const part = (await Part.findByPk(lot.partId, { transaction }))!;
  const links = await LotReceiver.findAll({ where: { lotId: lot.id }, transaction });
  const receiverRevisions = await ReceiverRevision.findAll({
    where: { id: links.map((link) => link.receiverRevisionId) },
    include: [{ model: Receiver, as: 'receiver' }],
    transaction,
  });
  const everyUnit: SamplingRule = { kind: 'everyUnit', allowedNonconforming: 0 };
  return {
    part: {
      id: part.id,
      partNumber: part.partNumber,
      revisionId: revision.id,
      revision: revision.revision,
      effectiveFrom: revision.effectiveFrom,
      criteria: revision.criteria,
    },
    receivers: receiverRevisions
      .map((r) => ({
        receiverId: r.receiverId,
        revisionId: r.id,
        name: r.receiver!.name,
        revision: r.revision,
        criteria: r.criteria,
      }))
      .sort((a, b) => a.name.localeCompare(b.name)),
    samplingRule: lot.inspectAll ? everyUnit : revision.criteria.samplingRule,
    severity: lot.severity,
    lotSize: lot.lotSize,
    bench: await judgingBench(transaction, lot),
  };
}

/** Of several benches the least certain one, as it measured on the day; out of calibration if any of them was. */
async function judgingBench(transaction: Transaction, lot: Lot): Promise<JudgingBench | null> {
  const uploads = await Upload.findAll({
    where: { lotId: lot.parentLotId ? [lot.id, lot.parentLotId] : lot.id, state: 'done' },
    include: [{ model: Bench, as: 'bench' }],
    transaction,
  });
  const measured = uploads.filter((upload) => upload.bench && upload.benchUncertaintyPpm !== null);
  measured.sort((a, b) => b.benchUncertaintyPpm! - a.benchUncertaintyPpm! || a.number - b.number);
  const worst = measured[0];
  if (!worst) return null;
  return {
    name: worst.bench!.name,
    expandedUncertaintyPpm: worst.benchUncertaintyPpm!,
    coverageFactor: worst.bench!.coverageFactor,
    calibrationDue: worst.bench!.calibrationDue,
    inCalibration: measured.every((upload) => upload.benchInCalibration !== false),
  };
}
