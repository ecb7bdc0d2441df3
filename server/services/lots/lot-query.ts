import { QueryTypes } from 'sequelize';
import { type z } from 'zod';
import { type LotFilter } from '@shared/contract/lots';
import { likePattern, decodeCursor } from '../../database/keyset';
import { Lot } from '../../models';
import { type LotRecord } from '../../presenters/lot-row';

export type Filter = Partial<Omit<z.output<typeof LotFilter>, 'sort'>> & {
  sort: z.output<typeof LotFilter>['sort'];
};

const columns = `
  l.id, l.lot_number, l.state, l.state_since, l.part_id, p.part_number, p.device_kind, pr.revision, pr.nominal_frequency_hz::text,
  l.supplier_id, s.name AS supplier_name, l.date_code, l.purchase_order, l.lot_size, l.received_on::text, l.units_measured, l.units_planned,
  l.beyond_count, l.finding, l.band_strip, l.parent_lot_id, l.version, l.created_at,
  (SELECT count(*)::int FROM uploads u WHERE u.lot_id = l.id AND u.state IN ('queued', 'running')) AS uploads_running,
  d.signed_by AS second_from, h.state AS hold_state, h.acknowledgement_due_at, h.answer_due_at`;

const joins = `
  JOIN parts p ON p.id = l.part_id
  JOIN part_revisions pr ON pr.id = l.part_revision_id
  JOIN suppliers s ON s.id = l.supplier_id
  LEFT JOIN dispositions d ON d.lot_id = l.id AND d.state = 'awaiting_second'
  LEFT JOIN holds h ON h.lot_id = l.id AND h.state <> 'closed'`;

/** Sort keys, the id breaking ties, so that no row is skipped or shown twice while paging. */
const sorts = {
  stateSince: {
    sql: 'state_since',
    cast: 'timestamptz',
    value: (row: LotRecord) => row.state_since.toISOString(),
  },
  receivedOn: { sql: 'received_on', cast: 'date', value: (row: LotRecord) => row.received_on },
  lotNumber: { sql: 'lot_number', cast: 'text', value: (row: LotRecord) => row.lot_number },
  lotSize: { sql: 'lot_size', cast: 'int', value: (row: LotRecord) => row.lot_size },
} as const;

function sortOf(sort: Filter['sort']) {
  const descending = sort.startsWith('-');
  return { ...sorts[(descending ? sort.slice(1) : sort) as keyof typeof sorts], descending };
}

/** WHERE of a filter over `lots l` alone, so that the page is cut before anything is joined. */
export function lotConditions(filter: Filter): {
  sql: string;
  replacements: Record<string, unknown>;
} {
  const parts: string[] = ['true'];
  const replacements: Record<string, unknown> = {};
  const add = (sql: string, values: Record<string, unknown>) => {
    parts.push(sql);
    Object.assign(replacements, values);
  };
  if (filter.find) {
    add(
      `(l.lot_number ILIKE :find OR l.purchase_order ILIKE :find OR l.date_code = :exact
        OR l.part_id IN (SELECT id FROM parts WHERE part_number ILIKE :find)
        OR l.supplier_id IN (SELECT id FROM suppliers WHERE name ILIKE :find))`,
      { find: likePattern(filter.find), exact: filter.find },
    );
  }
  if (filter.state?.length) add('l.state IN (:states)', { states: filter.state });
  if (filter.supplierId) add('l.supplier_id = :supplierId', { supplierId: filter.supplierId });
  if (filter.partId) add('l.part_id = :partId', { partId: filter.partId });
  if (filter.dateCode) add('l.date_code = :dateCode', { dateCode: filter.dateCode });
  if (filter.purchaseOrder)
    add('l.purchase_order ILIKE :purchaseOrder', {
      purchaseOrder: likePattern(filter.purchaseOrder),
    });
  if (filter.receivedFrom)
    add('l.received_on >= :receivedFrom', { receivedFrom: filter.receivedFrom });
  if (filter.receivedTo) add('l.received_on <= :receivedTo', { receivedTo: filter.receivedTo });
  return { sql: parts.join(' AND '), replacements };
}

/** Rows of the list: at most `limit`, after the cursor. */
export async function queryLots(
  filter: Filter,
  limit: number,
  after?: string,
): Promise<LotRecord[]> {
  const sort = sortOf(filter.sort);
  const where = lotConditions(filter);
  if (after) {
    const [value, id] = decodeCursor(after, 2);
    where.sql += ` AND (l.${sort.sql}, l.id) ${sort.descending ? '<' : '>'} (CAST(:afterValue AS ${sort.cast}), CAST(:afterId AS uuid))`;
    Object.assign(where.replacements, { afterValue: String(value), afterId: String(id) });
  }
  const direction = sort.descending ? 'DESC' : 'ASC';
  const order = `ORDER BY l.${sort.sql} ${direction}, l.id ${direction}`;
  return Lot.sequelize!.query<LotRecord>(
    `SELECT ${columns} FROM (SELECT * FROM lots l WHERE ${where.sql} ${order} LIMIT :limit) l ${joins} ${order}`,
    { replacements: { ...where.replacements, limit }, type: QueryTypes.SELECT },
  );
}

export function lotCursor(sort: Filter['sort']) {
  const { value } = sortOf(sort);
  return (row: LotRecord): (string | number)[] => [value(row), row.id];
}

export async function queryLotsByIds(ids: string[]): Promise<LotRecord[]> {
  if (ids.length === 0) return [];
  return Lot.sequelize!.query<LotRecord>(
    `SELECT ${columns} FROM lots l ${joins} WHERE l.id IN (:ids)`,
    { replacements: { ids }, type: QueryTypes.SELECT },
  );
}
