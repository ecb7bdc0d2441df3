import { type Pool } from 'pg';

export interface Disagreement {
  uploadNumber: number;
  reason: string;
}

/**
 * Proves what a foreign key would: every reading belongs to an upload that was loaded, and every loaded upload has exactly
 * the rows it says it took. Reads all readings once; part of the nightly check.
 */
export async function reconcileReadings(pool: Pool): Promise<Disagreement[]> {
  const { rows } = await pool.query<{
    upload_number: number;
    state: string | null;
    rows_taken: number | null;
    lines: string | null;
  }>(
    `WITH kept AS (
       SELECT upload_number, count(*) AS lines
       FROM (SELECT DISTINCT upload_number, file_line FROM readings) lines GROUP BY upload_number)
     SELECT coalesce(u.number, kept.upload_number) AS upload_number, u.state, u.rows_taken, kept.lines
     FROM uploads u FULL JOIN kept ON kept.upload_number = u.number
     WHERE CASE WHEN u.state IN ('done', 'withdrawn') THEN coalesce(kept.lines, 0) <> u.rows_taken ELSE kept.lines IS NOT NULL END
     ORDER BY 1 LIMIT 100`,
  );
  return rows.map(({ upload_number, state, rows_taken, lines }) => ({
    uploadNumber: upload_number,
    reason:
      state === 'done' || state === 'withdrawn'
        ? `${lines ?? 0} rows are kept, ${rows_taken} were taken`
        : `${lines} rows are kept of an upload that ${state === null ? 'does not exist' : `is ${state}`}`,
  }));
}
