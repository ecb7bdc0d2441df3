import { type Lot as LotView, type LotRow } from '@shared/contract/lots';
import { type QueryOf } from '@shared/contract/endpoint';
import { type listLots } from '@shared/contract/lots';
import { page } from '../../database/keyset';
import { type Actor } from '../../http/actor';
import { NotFound } from '../../http/errors';
import { Hold, Lot, PartRevision, Receiver, ReceiverRevision } from '../../models';
import {
  mayChangeLot,
  mayCountersign,
  mayDecide,
  mayRejudge,
  mayUpload,
} from '../../policies/lots';
import { revisionInForce } from '../../policies/revisions';
import { presentLotRow } from '../../presenters/lot-row';
import { presentPartRevision, presentReceiverRevision, todayIso } from '../../presenters/revision';
import { planOf } from './criteria-at-receipt';
import { lotFacts } from './lot-facts';
import { lotCursor, queryLots, queryLotsByIds } from './lot-query';

export async function readLots(
  actor: Actor,
  query: QueryOf<typeof listLots>,
): Promise<{ items: LotRow[]; next: string | null }> {
  const { limit, after, ...filter } = query;
  return page(
    await queryLots(filter, limit + 1, after),
    limit,
    (row) => presentLotRow(row, actor),
    lotCursor(filter.sort),
  );
}

export async function readLot(actor: Actor, id: string): Promise<LotView> {
  const [record] = await queryLotsByIds([id]);
  const lot = await Lot.findByPk(id, {
    include: [
      { association: 'partRevision', include: ['creator', 'approval'] },
      {
        association: 'receiverRevisions',
        include: ['creator', 'approval', { model: Receiver, as: 'receiver' }],
      },
      'registrar',
      'parent',
      { association: 'subLots', separate: true, order: ['lotNumber'] },
    ],
  });
  if (!record || !lot) throw new NotFound('This lot');
  const revision = lot.partRevision!;
  const siblings = await PartRevision.findAll({ where: { partId: lot.partId } });
  const receiverSiblings = await ReceiverRevision.findAll({
    where: { receiverId: lot.receiverRevisions!.map((r) => r.receiverId) },
  });
  const hold = await Hold.findOne({
    where: { lotId: id, state: ['open', 'acknowledged', 'answered'] },
  });
  const { owed, facts } = await lotFacts(lot, revision.criteria);
  const plan = planOf(lot, revision.criteria.samplingRule);
  const today = revisionInForce(siblings, todayIso());
  const newerReceiver = lot.receiverRevisions!.some((r) => {
    const own = receiverSiblings.filter((sibling) => sibling.receiverId === r.receiverId);
    const inForce = revisionInForce(own, todayIso());
    return inForce && inForce.id !== r.id;
  });
  return {
    ...presentLotRow(record, actor),
    registeredBy: { id: lot.registeredBy, name: lot.registrar?.name ?? '' },
    partRevision: presentPartRevision(revision, siblings),
    receivers: lot.receiverRevisions!.map((r) => ({
      ...presentReceiverRevision(
        r,
        receiverSiblings.filter((sibling) => sibling.receiverId === r.receiverId),
      ),
      name: r.receiver!.name,
    })),
    newerRevision: today && today.id !== revision.id ? today.revision : null,
    severity: lot.severity,
    severityReasons: lot.severityReasons,
    plan: {
      text: plan.description,
      sampleSize: plan.sampleSize,
      codeLetter: 'codeLetter' in plan ? plan.codeLetter : null,
      acceptanceNumber: 'acceptanceNumber' in plan ? plan.acceptanceNumber : null,
      rejectionNumber: 'rejectionNumber' in plan ? plan.rejectionNumber : null,
      acceptabilityConstant: 'k' in plan ? plan.k : null,
    },
    owed,
    currentAnalysisId: lot.currentAnalysisId,
    openHoldId: hold?.id ?? null,
    parent: lot.parent ? { id: lot.parent.id, lotNumber: lot.parent.lotNumber } : null,
    subLots: (lot.subLots ?? []).map(({ id: subId, lotNumber, state, lotSize }) => ({
      id: subId,
      lotNumber,
      state,
      lotSize,
    })),
    may: {
      upload: mayUpload(actor, lot.state),
      decide: mayDecide(actor, facts),
      countersign: mayCountersign(actor, facts),
      rejudge:
        mayRejudge(actor, facts) && (newerReceiver || Boolean(today && today.id !== revision.id)),
      withdrawUpload: mayUpload(actor, lot.state),
      change: mayChangeLot(actor, facts),
    },
  };
}
