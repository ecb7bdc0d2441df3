import { type HistoryEntry } from '@shared/contract/history';
import { database } from '../../database/connection';
import { decodeCursor, page } from '../../database/keyset';
import { NotFound } from '../../http/errors';
import { presentHistoryEntry } from '../../presenters/history';
import {
  historyColumns,
  historyConditions,
  historyJoins,
  type Filter,
  type HistoryRow,
} from './history-query';

/** Newest first. */
export async function readHistory(
  filter: Filter,
  limit: number,
  after?: string,
): Promise<{ items: HistoryEntry[]; next: string | null }> {
  const { sql, values } = historyConditions(filter);
  const before = after ? Number(decodeCursor(after, 1)[0]) : null;
  const { rows } = await database().pool.query<HistoryRow>(
    `SELECT ${historyColumns} ${historyJoins} WHERE ${sql} ${before === null ? '' : `AND s.sequence < ${Number(before) || 0}`}
     ORDER BY s.sequence DESC LIMIT ${limit + 1}`,
    values,
  );
  return page(rows, limit, presentHistoryEntry, (row) => [Number(row.sequence)]);
}

/** What occurs, for the filters of the page. */
export async function readActs() {
  const { pool } = database();
  const [acts, recordTypes, people] = await Promise.all([
    pool.query<{ act: string }>('SELECT DISTINCT act FROM history_entries ORDER BY act'),
    pool.query<{ record_type: string }>(
      'SELECT DISTINCT record_type FROM history_entries ORDER BY record_type',
    ),
    pool.query<{ id: string; name: string }>(
      'SELECT p.id::text AS id, p.name FROM people p WHERE EXISTS (SELECT FROM history_entries e WHERE e.actor_id = p.id::text) ORDER BY p.name',
    ),
  ]);
  return {
    acts: acts.rows.map((r) => r.act),
    recordTypes: recordTypes.rows.map((r) => r.record_type),
    people: people.rows,
  };
}

/** A record as it stood after entry `sequence` (default: the newest): every change up to there laid over the ones before. */
export async function readRecordAt(recordType: string, recordId: string, sequence?: number) {
  const { rows } = await database().pool.query<HistoryRow>(
    `SELECT ${historyColumns} ${historyJoins} WHERE e.record_type = $1 AND e.record_id = $2 AND ($3::bigint IS NULL OR s.sequence <= $3) ORDER BY s.sequence`,
    [recordType, recordId, sequence ?? null],
  );
  if (rows.length === 0) throw new NotFound('This record');
  const entries = rows.map(presentHistoryEntry);
  const fields = entries.reduce<Record<string, unknown>>(
    (state, entry) => ({ ...state, ...entry.after }),
    {},
  );
  return { recordType, recordId, sequence: entries.at(-1)!.sequence, fields };
}
