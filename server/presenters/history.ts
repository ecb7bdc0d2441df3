import { type HistoryEntry } from '@shared/contract/history';
import { type HistoryRow } from '../services/history/history-query';

interface Payload {
  id: string;
  at: string;
  act: string;
  actorId: string;
  actorKind: string;
  actorRole: string;
  recordType: string;
  recordId: string;
  lotId: string | null;
  before: Record<string, unknown> | null;
  after: Record<string, unknown> | null;
  reason: string;
}

function merge(sealed: Record<string, unknown> | null, personal: Record<string, unknown> | null) {
  return personal ? { ...sealed, ...personal } : sealed;
}

export function presentHistoryEntry(row: HistoryRow): HistoryEntry {
  const payload = JSON.parse(row.payload) as Payload;
  return {
    sequence: Number(row.sequence),
    id: payload.id,
    at: payload.at,
    act: payload.act,
    actor: {
      id: payload.actorId,
      name: row.actor_name ?? (payload.actorKind === 'system' ? 'Quartzhold' : payload.actorKind),
      role: payload.actorRole,
    },
    recordType: payload.recordType,
    recordId: payload.recordId,
    recordLabel: row.record_label ?? '',
    lotId: payload.lotId,
    before: merge(payload.before, row.personal_before),
    after: merge(payload.after, row.personal_after),
    reason: payload.reason,
    previousHash: row.previous_hash,
    hash: row.hash,
  };
}
