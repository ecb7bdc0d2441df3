import { type QueryOf } from '@shared/contract/endpoint';
import { type exportHistory } from '@shared/contract/history';
import { InvalidInput } from '../../http/errors';
import { likePattern } from '../../database/keyset';

export type Filter = QueryOf<typeof exportHistory>;

export interface HistoryRow {
  sequence: string;
  previous_hash: string;
  hash: string;
  payload: string;
  actor_name: string | null;
  actor_role: string | null;
  record_label: string | null;
  personal_before: Record<string, unknown> | null;
  personal_after: Record<string, unknown> | null;
}

/** One entry with the names that belong to its ids today; the chain itself holds ids only. */
export const historyColumns = `
  s.sequence, s.previous_hash, s.hash, e.payload, actor.name AS actor_name, actor.role AS actor_role,
  CASE e.record_type
    WHEN 'lot' THEN (SELECT lot_number FROM lots WHERE id::text = e.record_id)
    WHEN 'part' THEN (SELECT part_number FROM parts WHERE id::text = e.record_id)
    WHEN 'part_revision' THEN (SELECT p.part_number || ' revision ' || r.revision FROM part_revisions r JOIN parts p ON p.id = r.part_id WHERE r.id::text = e.record_id)
    WHEN 'receiver' THEN (SELECT name FROM receivers WHERE id::text = e.record_id)
    WHEN 'receiver_revision' THEN (SELECT p.name || ' revision ' || r.revision FROM receiver_revisions r JOIN receivers p ON p.id = r.receiver_id WHERE r.id::text = e.record_id)
    WHEN 'supplier' THEN (SELECT name FROM suppliers WHERE id::text = e.record_id)
    WHEN 'bench' THEN (SELECT name FROM benches WHERE id::text = e.record_id)
    WHEN 'person' THEN (SELECT name FROM people WHERE id::text = e.record_id)
    WHEN 'upload' THEN (SELECT file_name FROM uploads WHERE id::text = e.record_id)
    WHEN 'disposition' THEN (SELECT l.lot_number || ' decision ' || d.number FROM dispositions d JOIN lots l ON l.id = d.lot_id WHERE d.id::text = e.record_id)
    WHEN 'hold' THEN (SELECT number FROM holds WHERE id::text = e.record_id)
    WHEN 'mail' THEN (SELECT subject FROM mails WHERE id::text = e.record_id)
  END AS record_label,
  x.before AS personal_before, x.after AS personal_after`;

export const historyJoins = `
  FROM history_seals s
  JOIN history_entries e ON e.id = s.entry_id
  LEFT JOIN people actor ON actor.id::text = e.actor_id
  LEFT JOIN history_personal x ON x.entry_id = e.id`;

/** WHERE of a filter, with numbered parameters for node-postgres. */
export function historyConditions(filter: Filter): { sql: string; values: unknown[] } {
  const parts: string[] = [];
  const values: unknown[] = [];
  const add = (sql: string, value: unknown) => {
    values.push(value);
    parts.push(sql.replaceAll('?', `$${values.length}`));
  };
  if (filter.sequence) add('s.sequence = ?', filter.sequence);
  if (filter.act) add('e.act = ?', filter.act);
  if (filter.actorId) add('e.actor_id = ?', filter.actorId);
  if (filter.recordType) add('e.record_type = ?', filter.recordType);
  if (filter.recordId) add('e.record_id = ?', filter.recordId);
  if (filter.lotId) add('e.lot_id = ?', filter.lotId);
  if (filter.from) add('e.at >= ?', instant(filter.from, 'from', false));
  if (filter.to) add('e.at <= ?', instant(filter.to, 'to', true));
  if (filter.field)
    add(
      `(e.payload::jsonb -> 'before' -> ? IS NOT NULL OR e.payload::jsonb -> 'after' -> ? IS NOT NULL)`,
      filter.field,
    );
  if (filter.find) add('(e.payload ILIKE ? OR actor.name ILIKE ?)', likePattern(filter.find));
  return { sql: parts.length ? parts.join(' AND ') : 'true', values };
}

/** A day means its whole length at the `to` end. */
function instant(text: string, field: string, endOfDay: boolean): Date {
  const day = /^\d{4}-\d{2}-\d{2}$/.test(text);
  const at = new Date(day ? `${text}T${endOfDay ? '23:59:59.999' : '00:00:00'}Z` : text);
  if (Number.isNaN(at.getTime()))
    throw new InvalidInput('Write a day such as 2026-11-30, or a time with zone.', {
      [field]: 'This is not a day or a time.',
    });
  return at;
}
