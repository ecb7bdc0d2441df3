import { QueryTypes, type Transaction } from 'sequelize';
import { enqueue } from '../../jobs/boss';
import { queues } from '../../jobs/queues';
import { Lot } from '../../models';
import { type RevisedKind } from './kinds';

const underRevision = {
  part: 'part_revision_id = :revisionId',
  receiver: 'id IN (SELECT lot_id FROM lot_receivers WHERE receiver_revision_id = :revisionId)',
} as const;

/**
 * Lots that were registered against a draft are judged by what the draft says now: what was analysed by its earlier text
 * can no longer be signed, and is made anew. An approved revision never changes, so no other lot is ever touched.
 */
export async function judgeDraftLotsAnew(
  transaction: Transaction,
  kind: RevisedKind,
  revisionId: string,
): Promise<void> {
  const lots = await Lot.sequelize!.query<{ id: string }>(
    `SELECT id FROM lots WHERE ${underRevision[kind]} AND state <> 'rejected' ORDER BY id FOR NO KEY UPDATE`,
    { replacements: { revisionId }, type: QueryTypes.SELECT, transaction },
  );
  if (lots.length === 0) return;
  const ids = lots.map(({ id }) => id);
  await Lot.increment({ dataVersion: 1 }, { where: { id: ids }, transaction });
  for (const lotId of ids) await enqueue(transaction, queues.analyse, { lotId });
}
