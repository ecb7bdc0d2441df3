import { QueryTypes, type Transaction } from 'sequelize';
import { type z } from 'zod';
import { type WithdrawalPreview } from '@shared/contract/uploads';
import { database } from '../../database/connection';
import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { Conflict } from '../../http/errors';
import { enqueue } from '../../jobs/boss';
import { queues } from '../../jobs/queues';
import { type Lot, Upload } from '../../models';
import { mayWithdraw, type UploadFacts, whyNotWithdraw } from '../../policies/uploads';
import { lockLot } from '../lots/find-lot';
import { findUpload } from './find-upload';

const factsOf = (upload: Upload, lot: Lot): UploadFacts => ({
  state: upload.state,
  uploadedBy: upload.uploadedBy,
  lotState: lot.state,
});

/** What would go with an upload, and what stays because a signature rests on it. */
export async function previewWithdrawal(
  actor: Actor,
  id: string,
): Promise<z.input<typeof WithdrawalPreview>> {
  const upload = await findUpload(id);
  const allowed = mayWithdraw(actor, factsOf(upload, upload.lot!));
  const stays = await signedOn(upload);
  return {
    rowsGoing: upload.state === 'done' ? upload.rowsTaken : 0,
    unitsGoing: upload.state === 'done' ? await unitsOnlyHere(upload) : 0,
    staysBecause: [
      ...(allowed ? [] : [whyNotWithdraw(actor, factsOf(upload, upload.lot!))]),
      ...stays,
      'The original file, the history and the refused rows stay readable.',
    ],
    allowed,
  };
}

/** Takes an upload out of the count. Its rows and bytes stay where they are, because the history and old analyses name them. */
export async function withdrawUpload(actor: Actor, id: string, reason: string): Promise<void> {
  const before = await findUpload(id);
  await act(actor, 'upload.withdraw', async (transaction) => {
    const lot = await lockLot(before.lotId, transaction);
    const upload = (await Upload.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE }))!;
    const facts = factsOf(upload, lot);
    if (!mayWithdraw(actor, facts))
      throw new Conflict('upload.not_withdrawable', whyNotWithdraw(actor, facts));
    const counted = upload.state === 'done' && upload.rowsTaken > 0;
    const oldState = upload.state;
    await upload.update(
      {
        state: 'withdrawn',
        stage: 'finished',
        withdrawnAt: new Date(),
        withdrawnBy: actor.id,
        withdrawnReason: reason,
      },
      { transaction },
    );
    if (counted) {
      await lot.update({ dataVersion: lot.dataVersion + 1 }, { transaction });
      await enqueue(transaction, queues.analyse, { lotId: lot.id });
    }
    return {
      result: undefined,
      entry: {
        recordType: 'upload',
        recordId: id,
        lotId: lot.id,
        before: { state: oldState },
        after: {
          state: 'withdrawn',
          rowsWithdrawn: counted ? upload.rowsTaken : 0,
          stays: await signedOn(upload, transaction),
        },
        reason,
      },
    };
  });
}

/** Dispositions whose analysis was made while this upload counted. */
async function signedOn(upload: Upload, transaction?: Transaction): Promise<string[]> {
  if (upload.state !== 'done' && upload.state !== 'withdrawn') return [];
  const rows = await database().sequelize.query<{
    number: number;
    decision: string;
    version: number;
  }>(
    `SELECT d.number, d.decision, a.version FROM dispositions d JOIN analyses a ON a.id = d.analysis_id
     WHERE d.lot_id = :lotId AND a.created_at >= :finishedAt ORDER BY d.number`,
    {
      replacements: { lotId: upload.lotId, finishedAt: upload.finishedAt ?? new Date(0) },
      type: QueryTypes.SELECT,
      transaction,
    },
  );
  return rows.map(
    (row) =>
      `Disposition ${row.number} (${row.decision.replaceAll('_', ' ')}) is signed on analysis ${row.version}, which rests on these readings: both stay as they were signed.`,
  );
}

async function unitsOnlyHere(upload: Upload): Promise<number> {
  const [row] = await database().sequelize.query<{ units: number }>(
    `SELECT count(*)::int AS units FROM (
       SELECT DISTINCT serial FROM readings WHERE upload_number = :number
       EXCEPT
       SELECT serial FROM readings WHERE upload_number IN (
         SELECT number FROM uploads WHERE lot_id = :lotId AND state = 'done' AND number <> :number)) x`,
    {
      replacements: { number: upload.number, lotId: upload.lotId },
      type: QueryTypes.SELECT,
    },
  );
  return row!.units;
}
