import { type Response } from 'express';
import { database } from '../../database/connection';
import {
  historyColumns,
  historyConditions,
  historyJoins,
  type Filter,
  type HistoryRow,
} from './history-query';

const batch = 2000;

/** Rows of the filter, oldest first, in batches: a long history is never held whole. */
export async function* historyRows(filter: Filter): AsyncGenerator<HistoryRow[]> {
  const { sql, values } = historyConditions(filter);
  let last = 0;
  for (;;) {
    const { rows } = await database().pool.query<HistoryRow>(
      `SELECT ${historyColumns} ${historyJoins} WHERE ${sql} AND s.sequence > ${last} ORDER BY s.sequence LIMIT ${batch}`,
      values,
    );
    if (rows.length > 0) yield rows;
    if (rows.length < batch) return;
    last = Number(rows.at(-1)!.sequence);
  }
}

async function manifestOf(filter: Filter) {
  const { sql, values } = historyConditions(filter);
  const { pool } = database();
  // Read before the entries are counted: a checkpoint made in between would seem to count entries that are missing.
  const { rows: checkpoints } = await pool.query(
    'SELECT count, head, at, signature, public_key FROM history_checkpoints ORDER BY count',
  );
  const { rows } = await pool.query<{
    count: string;
    first_hash: string | null;
    last_hash: string | null;
    first: string | null;
    last: string | null;
  }>(
    `SELECT count(*), min(s.sequence) AS first, max(s.sequence) AS last,
            (array_agg(s.hash ORDER BY s.sequence))[1] AS first_hash, (array_agg(s.hash ORDER BY s.sequence DESC))[1] AS last_hash
     ${historyJoins} WHERE ${sql}`,
    values,
  );
  const row = rows[0]!;
  return {
    format: 'quartzhold history export 1',
    exportedAt: new Date().toISOString(),
    filter,
    /** True when nothing was filtered out: then a verifier also finds missing entries. */
    complete: Object.values(filter).every((value) => value === undefined),
    count: Number(row.count),
    firstSequence: row.first === null ? null : Number(row.first),
    lastSequence: row.last === null ? null : Number(row.last),
    firstHash: row.first_hash,
    lastHash: row.last_hash,
    checkpoints: checkpoints.map((c) => ({
      count: Number(c.count),
      head: c.head,
      at: c.at.toISOString(),
      signature: c.signature,
      publicKey: c.public_key,
    })),
    caveat:
      'Proves order and content of the entries here, not that nothing came after them. Compare with a checkpoint kept elsewhere.',
  };
}

/** Streams {manifest, entries}; each entry carries the exact text that its hash covers. */
export async function writeHistoryExport(filter: Filter, response: Response): Promise<void> {
  // The newest entry is fixed first, so that manifest and entries speak of the same range while others go on writing.
  const { rows } = await database().pool.query<{ last: string }>(
    'SELECT coalesce(max(sequence), 0) AS last FROM history_seals',
  );
  const last = Number(rows[0]!.last);
  const manifest = await manifestOf(filter);
  response
    .type('application/json')
    .attachment(`quartzhold-history-${manifest.exportedAt.slice(0, 10)}.json`);
  response.write(`{"manifest":${JSON.stringify(manifest)},\n"entries":[`);
  let first = true;
  for await (const batchRows of historyRows(filter)) {
    for (const row of batchRows) {
      if (Number(row.sequence) > Math.max(last, manifest.lastSequence ?? 0)) break;
      const entry = {
        sequence: Number(row.sequence),
        previousHash: row.previous_hash,
        hash: row.hash,
        actorName: row.actor_name ?? '',
        recordLabel: row.record_label ?? '',
        payload: row.payload,
      };
      const text = `${first ? '\n' : ',\n'}${JSON.stringify(entry)}`;
      first = false;
      if (!response.write(text)) await new Promise((resume) => response.once('drain', resume));
    }
  }
  response.end('\n]}\n');
}
