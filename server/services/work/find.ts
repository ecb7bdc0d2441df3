import { type z } from 'zod';
import { type FindHit } from '@shared/contract/work';
import { database } from '../../database/connection';
import { likePattern } from '../../database/keyset';
import { type Actor } from '../../http/actor';
import { readHolds } from '../holds/read-holds';

type Hit = z.infer<typeof FindHit>;
const most = 6;

/** Lots, parts, serial numbers, receivers and suppliers; a supplier contact finds only own holds. */
export async function find(actor: Actor, text: string): Promise<{ items: Hit[]; next: null }> {
  if (actor.role === 'supplier_contact') {
    const { items } = await readHolds(actor, { find: text, limit: most });
    return {
      items: items.map((hold) => ({
        kind: 'hold',
        id: hold.id,
        label: hold.lot.lotNumber,
        detail: `hold, ${hold.part.partNumber}`,
        to: `/holds/${hold.id}`,
      })),
      next: null,
    };
  }
  const pattern = likePattern(text);
  const { pool } = database();
  const [lots, parts, others, serials] = await Promise.all([
    pool.query<{ id: string; lot_number: string; part_number: string; state: string }>(
      `SELECT l.id, l.lot_number, p.part_number, l.state FROM lots l JOIN parts p ON p.id = l.part_id
       WHERE l.lot_number ILIKE $1 ORDER BY lower(l.lot_number) = lower($2) DESC, l.received_on DESC LIMIT ${most}`,
      [pattern, text],
    ),
    pool.query<{ id: string; part_number: string; description: string }>(
      `SELECT id, part_number, description FROM parts WHERE part_number ILIKE $1 ORDER BY part_number LIMIT ${most}`,
      [pattern],
    ),
    pool.query<{ kind: 'receiver' | 'supplier'; id: string; name: string }>(
      `SELECT 'receiver' AS kind, id, name FROM receivers WHERE name ILIKE $1 UNION ALL SELECT 'supplier', id, name FROM suppliers WHERE name ILIKE $1 ORDER BY name LIMIT ${most}`,
      [pattern],
    ),
    // Exact: the summary index of serials answers equality quickly, a pattern would read every reading.
    pool.query<{ id: string; lot_number: string; serial: string }>(
      `SELECT DISTINCT l.id, l.lot_number, r.serial FROM readings r JOIN uploads u ON u.number = r.upload_number AND u.state = 'done' JOIN lots l ON l.id = u.lot_id
       WHERE r.serial = $1 LIMIT ${most}`,
      [text],
    ),
  ]);
  const states = (state: string) => state.replaceAll('_', ' ');
  return {
    items: [
      ...lots.rows.map((row): Hit => ({
        kind: 'lot',
        id: row.id,
        label: row.lot_number,
        detail: `${row.part_number}, ${states(row.state)}`,
        to: `/lots/${row.id}`,
      })),
      ...serials.rows.map((row): Hit => ({
        kind: 'serial',
        id: row.id,
        label: row.serial,
        detail: `unit of lot ${row.lot_number}`,
        to: `/lots/${row.id}?serial=${encodeURIComponent(row.serial)}`,
      })),
      ...parts.rows.map((row): Hit => ({
        kind: 'part',
        id: row.id,
        label: row.part_number,
        detail: row.description,
        to: `/parts/${row.id}`,
      })),
      ...others.rows.map((row): Hit => ({
        kind: row.kind,
        id: row.id,
        label: row.name,
        detail: row.kind,
        to: `/${row.kind}s/${row.id}`,
      })),
    ],
    next: null,
  };
}
