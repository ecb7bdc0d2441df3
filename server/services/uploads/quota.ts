import { QueryTypes, type Transaction } from 'sequelize';
import { config } from '../../config';
import { database } from '../../database/connection';
import { TooMany } from '../../http/errors';

/** Refuses when this person or bench token has uploaded more than its bytes of a day. */
export async function checkQuota(
  who: { personId: string | null; benchTokenId: string | null },
  moreBytes: number,
  transaction?: Transaction,
): Promise<void> {
  const [row] = await database().sequelize.query<{ used: string }>(
    `SELECT coalesce(sum(byte_count), 0) AS used FROM uploads
     WHERE created_at > now() - interval '1 day'
       AND (uploaded_by = :personId OR bench_token_id = :benchTokenId)`,
    { replacements: who, type: QueryTypes.SELECT, transaction },
  );
  if (Number(row!.used) + moreBytes > config().UPLOAD_QUOTA_BYTES_PER_DAY)
    throw new TooMany(
      'You have uploaded as much as one person may in a day. Please continue tomorrow, or ask the administrator to raise the limit.',
      3600,
      'upload.quota',
    );
}
