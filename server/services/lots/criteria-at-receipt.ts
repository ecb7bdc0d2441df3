import { QueryTypes, type Transaction } from 'sequelize';
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

interface JudgedLot {
  lot_number: string;
  lot_size: number;
  parent_lot_id: string | null;
  met: boolean;
  refused: number;
  corrected_before: boolean;
}

/**
 * Lots of the same part and supplier that were decided before, oldest first, as the switching rules see them: by the analysis
 * of the first decision that stood. What sorting or measuring anew made of a lot later does not make its first sample better.
 * Lots without a complete sample say nothing. Corrective action is agreed where a decision in this record says what was
 * corrected; it counts for the first lot registered after it.
 */
async function decidedLots(
  transaction: Transaction,
  supplierId: string,
  partId: string,
): Promise<{ lots: SwitchingLot[]; correctedSince: boolean }> {
  const rows = await Lot.sequelize!.query<JudgedLot & { corrected_since: boolean }>(
    `WITH record AS (
       SELECT id, lot_number, lot_size, parent_lot_id, received_on, created_at FROM lots
       WHERE supplier_id = :supplierId AND part_id = :partId
         AND state IN ('on_hold', 'accepted', 'accepted_under_concession', 'rejected')
     ), standing AS (
       SELECT d.lot_id, d.number, d.analysis_id, d.correction, d.signed_at
       FROM dispositions d JOIN record ON record.id = d.lot_id
       WHERE d.state IN ('in_force', 'superseded')
     ), judged AS (
       SELECT DISTINCT ON (s.lot_id) s.lot_id, a.result_text::jsonb AS result
       FROM standing s JOIN analyses a ON a.id = s.analysis_id
       ORDER BY s.lot_id, s.number
     ), sampled AS (
       SELECT record.*, result FROM record JOIN judged ON judged.lot_id = record.id
       WHERE jsonb_typeof(result #> '{sampling,met}') = 'boolean'
     ), arrived AS (
       SELECT *, lag(created_at, 1, '-infinity') OVER (ORDER BY received_on, created_at) AS previous_at,
         max(created_at) OVER () AS last_at
       FROM sampled
     )
     SELECT lot_number, lot_size, parent_lot_id, (result #> '{sampling,met}')::boolean AS met,
       CASE result #>> '{guardBand,rule,kind}'
         WHEN 'guardedAcceptance' THEN (result ->> 'units')::int - (result #>> '{guardBand,conforming}')::int
         WHEN 'guardedRejection' THEN (result #>> '{guardBand,nonconforming}')::int
         ELSE (result #>> '{beyond,limits,count}')::int
       END AS refused,
       EXISTS (
         SELECT FROM standing s WHERE s.correction <> '' AND s.signed_at <= arrived.created_at
           AND s.signed_at > arrived.previous_at
       ) AS corrected_before,
       EXISTS (
         SELECT FROM standing s WHERE s.correction <> '' AND s.signed_at > arrived.last_at
       ) AS corrected_since
     FROM arrived
     ORDER BY received_on, created_at`,
    { replacements: { supplierId, partId }, type: QueryTypes.SELECT, transaction },
  );
  return {
    lots: rows.map((row) => ({
      lotNumber: row.lot_number,
      lotSize: row.lot_size,
      accepted: row.met,
      beyond: row.refused,
      resubmitted: row.parent_lot_id !== null,
      correctiveActionAgreed: row.corrected_before,
    })),
    correctedSince: rows.at(-1)?.corrected_since ?? false,
  };
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
  const { lots, correctedSince } = await decidedLots(transaction, supplierId, partId);
  const record = switchingState(rule, lots, { correctiveActionAgreed: correctedSince });
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
