import { type Transaction } from 'sequelize';
import { planFor, type SamplingPlan } from '@shared/sampling/plan';
import { type SamplingRule } from '@shared/contract/parts';
import {
  switchingState,
  type InspectionState,
  type SwitchingLot,
} from '@shared/sampling/switching';
import { Lot, PartRevision, Receiver, ReceiverPart, ReceiverRevision } from '../../models';
import { revisionForReceipt } from '../../policies/revisions';

/** The part revision and the receiver revisions that a lot received on `day` is judged by. */
export async function criteriaAtReceipt(transaction: Transaction, partId: string, day: string) {
  const revisions = await PartRevision.findAll({ where: { partId }, transaction });
  const links = await ReceiverPart.findAll({ where: { partId }, transaction });
  const receivers = await Receiver.findAll({
    where: { id: links.map((link) => link.receiverId), active: true },
    include: [{ model: ReceiverRevision, as: 'revisions' }],
    transaction,
  });
  return {
    partRevision: revisionForReceipt(revisions, day),
    receiverRevisions: receivers.flatMap(
      (receiver) => revisionForReceipt(receiver.revisions ?? [], day) ?? [],
    ),
  };
}

/** Lots of the same part and supplier that were decided before, oldest first, as the switching rules see them. */
async function decidedLots(
  transaction: Transaction,
  supplierId: string,
  partId: string,
): Promise<SwitchingLot[]> {
  const lots = await Lot.findAll({
    where: {
      supplierId,
      partId,
      state: ['on_hold', 'accepted', 'accepted_under_concession', 'rejected'],
    },
    include: [{ association: 'dispositions', attributes: ['correction'] }],
    order: [
      ['receivedOn', 'ASC'],
      ['createdAt', 'ASC'],
    ],
    transaction,
  });
  return lots
    .filter((lot) => lot.planMet !== null)
    .map((lot, index, all) => ({
      lotNumber: lot.lotNumber,
      lotSize: lot.lotSize,
      accepted: lot.planMet!,
      beyond: lot.beyondCount ?? 0,
      resubmitted: lot.parentLotId !== null,
      // Agreed corrective action stands in the disposition that closed the hold of an earlier lot.
      correctiveActionAgreed:
        index > 0 && Boolean(all[index - 1]!.dispositions?.some((d) => d.correction !== '')),
    }));
}

export interface Inspection {
  severity: InspectionState;
  reasons: string[];
  plan: SamplingPlan;
}

/** How hard the lot is inspected, by the lot record of supplier and part, and the plan that follows. */
export async function inspectionFor(
  transaction: Transaction,
  {
    supplierId,
    partId,
    lotSize,
    rule,
  }: { supplierId: string; partId: string; lotSize: number; rule: SamplingRule },
): Promise<Inspection> {
  const record = switchingState(rule, await decidedLots(transaction, supplierId, partId));
  return {
    severity: record.state,
    reasons: record.sentences,
    plan: planFor(rule, lotSize, record.severity),
  };
}

/** The plan of a lot as registered; every unit once 100 % inspection is ordered. */
export function planOf(
  lot: { lotSize: number; severity: InspectionState; inspectAll: boolean },
  rule: SamplingRule,
): SamplingPlan {
  const severity = lot.severity === 'discontinued' ? 'tightened' : lot.severity;
  return lot.inspectAll
    ? planFor({ kind: 'everyUnit', allowedNonconforming: 0 }, lot.lotSize)
    : planFor(rule, lot.lotSize, severity);
}
