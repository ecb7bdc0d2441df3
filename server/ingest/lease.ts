import { randomUUID } from 'node:crypto';
import { type Pool } from 'pg';

/** A worker that says nothing for so long is taken for dead. */
export const leaseSeconds = 30;
/** After so many beginnings an upload fails for good. */
export const mostAttempts = 3;

export const uploadsChannel = 'quartzhold_uploads';

/**
 * Takes an upload for this worker, if nobody holds it. The claim is short and committed by itself; what keeps it is the
 * lease, which the holder renews and whose token is checked on every later write.
 */
export async function claimUpload(pool: Pool, uploadId: string): Promise<string | null> {
  const token = randomUUID();
  const { rowCount } = await pool.query(
    `UPDATE uploads SET state = 'running', stage = 'reading', lease_token = $2,
       lease_until = now() + make_interval(secs => $3), attempts = attempts + 1,
       started_at = coalesce(started_at, now()), bytes_read = 0, rows_in_file = 0, rows_taken = 0, rows_refused = 0
     WHERE id = (
       SELECT id FROM uploads WHERE id = $1
         AND (state = 'queued' OR (state = 'running' AND lease_until < now()))
       FOR UPDATE SKIP LOCKED)`,
    [uploadId, token, leaseSeconds],
  );
  return rowCount === 1 ? token : null;
}

/** Uploads whose worker went away: they are claimed anew. */
export async function lapsedUploads(pool: Pool): Promise<string[]> {
  const { rows } = await pool.query<{ id: string }>(
    `SELECT id FROM uploads
     WHERE (state = 'running' AND lease_until < now())
        OR (state = 'queued' AND created_at < now() - interval '1 minute')
     ORDER BY created_at LIMIT 20`,
  );
  return rows.map((row) => row.id);
}
