import { randomUUID } from 'node:crypto';
import { type Transaction } from 'sequelize';
import { inTransaction } from '../database/connection';
import { type Actor } from '../http/actor';
import { HistoryEntry, HistoryPersonal } from '../models';
import { canonicalJson } from './canonical';

export interface Entry {
  recordType: string;
  recordId: string;
  lotId?: string | null;
  /** Old and new values of what changed. Ids only: names and addresses of people go to `personal`. */
  before?: Record<string, unknown> | null;
  after?: Record<string, unknown> | null;
  reason?: string;
  /** Personal values, kept beside the chain so that a person can be forgotten without breaking a hash. */
  personal?: { before?: Record<string, unknown> | null; after?: Record<string, unknown> | null };
}

/** Server time, to the millisecond, as it is stored and hashed. */
function now(): Date {
  return new Date();
}

/** Writes one entry in the transaction of its act; the database seals it into the chain at commit. */
export async function record(
  transaction: Transaction,
  actor: Actor,
  name: string,
  entry: Entry,
): Promise<string> {
  const id = randomUUID();
  const at = now();
  const payload = canonicalJson({
    id,
    at,
    act: name,
    actorId: actor.id,
    actorKind: actor.kind,
    actorRole: actor.role,
    recordType: entry.recordType,
    recordId: entry.recordId,
    lotId: entry.lotId ?? null,
    before: entry.before ?? null,
    after: entry.after ?? null,
    reason: entry.reason ?? '',
  });
  await HistoryEntry.create(
    {
      id,
      at,
      act: name,
      actorId: actor.id,
      recordType: entry.recordType,
      recordId: entry.recordId,
      lotId: entry.lotId ?? null,
      payload,
    },
    { transaction },
  );
  if (entry.personal) {
    await HistoryPersonal.create(
      { entryId: id, before: entry.personal.before ?? null, after: entry.personal.after ?? null },
      { transaction },
    );
  }
  return id;
}

/**
 * One act of one actor: all its writes and exactly one history entry, in one transaction. `perform` returns the
 * result together with the entry; whatever it throws undoes everything.
 */
export function act<Result>(
  actor: Actor,
  name: string,
  perform: (transaction: Transaction) => Promise<{ result: Result; entry: Entry }>,
): Promise<Result> {
  return inTransaction(async (transaction) => {
    const { result, entry } = await perform(transaction);
    await record(transaction, actor, name, entry);
    return result;
  });
}
