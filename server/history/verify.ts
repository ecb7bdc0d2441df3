import { createHash, verify as verifySignature, createPublicKey } from 'node:crypto';
import { type PoolClient } from 'pg';
import { type Verification } from '@shared/contract/history';
import { database } from '../database/connection';
import { checkpointText, outsideCheckpoints, type SignedCheckpoint } from './checkpoint';

const caveat =
  'This shows that no entry was changed, removed from the middle, put in between or moved since it was sealed. It cannot show that the newest entries are all there: compare count and head with a checkpoint kept outside the product. Nor does it show that what people wrote was true.';

const firstPrevious = '0'.repeat(64);
const batch = 5000;

interface Row {
  sequence: string;
  entry_id: string;
  previous_hash: string;
  hash: string;
  payload: string | null;
  at: string | null;
  act: string | null;
  actor_id: string | null;
  record_type: string | null;
  record_id: string | null;
  lot_id: string | null;
}

export function sealHash(sequence: string | number, previousHash: string, payload: string): string {
  return createHash('sha256')
    .update(`${sequence}\n${previousHash}\n${payload}`, 'utf8')
    .digest('hex');
}

/** What is wrong with one entry, or null. */
function fault(row: Row, expectedSequence: number, expectedPrevious: string): string | null {
  if (Number(row.sequence) !== expectedSequence) return `entry ${expectedSequence} is missing`;
  if (row.previous_hash !== expectedPrevious) return 'does not follow the entry before it';
  if (row.payload === null) return 'its content is missing';
  if (row.hash !== sealHash(row.sequence, row.previous_hash, row.payload))
    return 'its content does not match its seal';
  const content = JSON.parse(row.payload) as Record<string, unknown>;
  const columns: [string, unknown, unknown][] = [
    ['id', content.id, row.entry_id],
    ['time', content.at, row.at],
    ['act', content.act, row.act],
    ['person', content.actorId, row.actor_id],
    ['record type', content.recordType, row.record_type],
    ['record', content.recordId, row.record_id],
    ['lot', content.lotId, row.lot_id],
  ];
  const differing = columns.find(([, sealed, shown]) => sealed !== shown);
  return differing ? `its ${differing[0]} as shown differs from what was sealed` : null;
}

/**
 * Checks the whole chain: sequence without gaps, each link, each content, the columns shown in lists, entries without a
 * seal, and every checkpoint. Stops at the first broken entry and names it.
 */
export async function verifyHistory(
  onProgress?: (checked: number, total: number) => void,
): Promise<Verification> {
  const startedAt = new Date().toISOString();
  const outside = await outsideCheckpoints();
  const client = await database().pool.connect();
  try {
    // One snapshot for the whole check: acts that commit meanwhile are not half seen.
    await client.query('BEGIN ISOLATION LEVEL REPEATABLE READ READ ONLY');
    const result = await checkChain(client, outside, onProgress);
    await client.query('COMMIT');
    client.release();
    return { ...result, startedAt, finishedAt: new Date().toISOString(), caveat };
  } catch (error) {
    client.release(error as Error);
    throw error;
  }
}

async function checkChain(
  client: PoolClient,
  outside: SignedCheckpoint[],
  onProgress?: (checked: number, total: number) => void,
) {
  const { rows: totals } = await client.query<{ total: string; unsealed: string }>(
    `SELECT (SELECT count(*) FROM history_seals) AS total,
            (SELECT count(*) FROM history_entries e WHERE NOT EXISTS (SELECT FROM history_seals s WHERE s.entry_id = e.id)) AS unsealed`,
  );
  const total = Number(totals[0]!.total);
  const heads = new Map<number, string>([[0, firstPrevious]]);
  const { rows: kept } = await client.query<{
    count: string;
    head: string;
    at: Date;
    signature: string;
    public_key: string;
  }>('SELECT count, head, at, signature, public_key FROM history_checkpoints ORDER BY count');
  // Those in files count as much as those in the table: they are what a rewritten database cannot have touched.
  const checkpoints: SignedCheckpoint[] = [
    ...kept.map((row) => ({
      count: Number(row.count),
      head: row.head,
      at: row.at.toISOString(),
      signature: row.signature,
      publicKey: row.public_key,
    })),
    ...outside,
  ];
  const wanted = new Set(checkpoints.map((checkpoint) => checkpoint.count));
  let checked = 0;
  let previous = firstPrevious;
  const broken = (sequence: number, reason: string) => ({
    ok: false,
    entriesChecked: checked,
    firstBroken: { sequence, reason },
    head: previous,
    count: total,
    checkpointsChecked: 0,
  });
  for (;;) {
    const { rows } = await client.query<Row>(
      `SELECT s.sequence, s.entry_id, s.previous_hash, s.hash, e.payload, e.act, e.actor_id, e.record_type, e.record_id, e.lot_id,
              to_char(e.at AT TIME ZONE 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') AS at
       FROM history_seals s LEFT JOIN history_entries e ON e.id = s.entry_id
       WHERE s.sequence > $1 ORDER BY s.sequence LIMIT ${batch}`,
      [checked],
    );
    for (const row of rows) {
      const reason = fault(row, checked + 1, previous);
      if (reason) return broken(checked + 1, reason);
      checked += 1;
      previous = row.hash;
      if (wanted.has(checked)) heads.set(checked, previous);
    }
    onProgress?.(checked, total);
    if (rows.length < batch) break;
  }
  if (Number(totals[0]!.unsealed) > 0)
    return broken(checked + 1, 'an entry was put in without a seal');
  for (const checkpoint of checkpoints) {
    const { count, head, signature, publicKey } = checkpoint;
    if (count > checked)
      return broken(
        checked + 1,
        `a checkpoint counted ${count} entries, ${checked} are left: the newest were removed`,
      );
    if (heads.get(count) !== head)
      return broken(count, 'differs from the checkpoint made when it was the newest');
    if (
      !verifySignature(
        null,
        Buffer.from(checkpointText(checkpoint)),
        createPublicKey(publicKey),
        Buffer.from(signature, 'base64'),
      )
    ) {
      return broken(count, 'its checkpoint carries a signature that does not fit');
    }
  }
  return {
    ok: true,
    entriesChecked: checked,
    firstBroken: null,
    head: previous,
    count: total,
    checkpointsChecked: checkpoints.length,
  };
}
