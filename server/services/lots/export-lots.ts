import { type Response } from 'express';
import { Disposition, Signature } from '../../models';
import { type LotRecord } from '../../presenters/lot-row';
import { encodeCursor } from '../../database/keyset';
import { writeCsv, type CsvColumn } from '../../reports/csv';
import { lotCursor, queryLots, type Filter } from './lot-query';

const batch = 1000;

type SignedLot = LotRecord & { decision: string | null; signatures: Signature[] };

const columns: CsvColumn<SignedLot>[] = [
  { header: 'lot_number', kind: 'text', value: (l) => l.lot_number },
  { header: 'state', kind: 'text', value: (l) => l.state },
  { header: 'state_since', kind: 'text', value: (l) => l.state_since.toISOString() },
  { header: 'part_number', kind: 'text', value: (l) => l.part_number },
  { header: 'part_revision', kind: 'text', value: (l) => l.revision },
  { header: 'nominal_frequency_hz', kind: 'number', value: (l) => l.nominal_frequency_hz },
  { header: 'supplier', kind: 'text', value: (l) => l.supplier_name },
  { header: 'date_code', kind: 'text', value: (l) => l.date_code },
  { header: 'purchase_order', kind: 'text', value: (l) => l.purchase_order },
  { header: 'lot_size_units', kind: 'number', value: (l) => l.lot_size },
  { header: 'received_on', kind: 'text', value: (l) => l.received_on },
  { header: 'units_measured', kind: 'number', value: (l) => l.units_measured },
  { header: 'units_planned', kind: 'number', value: (l) => l.units_planned },
  { header: 'units_beyond_limits', kind: 'number', value: (l) => l.beyond_count },
  { header: 'mean_ppm', kind: 'number', value: (l) => l.band_strip?.meanPpm ?? null },
  { header: 'sd_ppm', kind: 'number', value: (l) => l.band_strip?.sdPpm ?? null },
  { header: 'finding', kind: 'text', value: (l) => l.finding },
  { header: 'decision', kind: 'text', value: (l) => l.decision },
  ...(
    [
      ['signed_by', ({ printedName }) => printedName],
      ['signed_at', ({ signedAt }) => signedAt.toISOString()],
      ['signed_zone', ({ zone }) => zone],
      ['signature_meaning', ({ meaning }) => meaning],
      ['signature_reason', ({ reason }) => reason],
      ['signature_sha256', ({ contentHash }) => contentHash],
    ] as [string, (signature: Signature) => string][]
  ).map(([header, tell]): CsvColumn<SignedLot> => ({
    header,
    kind: 'text',
    // Of a concession both, in the order they were given.
    value: (l) => l.signatures.map(tell).join('; '),
  })),
];

/** The decision that counts on each lot, with its signatures. */
async function withSignatures(rows: LotRecord[]): Promise<SignedLot[]> {
  const decisions = await Disposition.findAll({
    where: { lotId: rows.map((row) => row.id), state: 'in_force' },
  });
  const signatures = await Signature.findAll({
    where: { recordType: 'disposition', recordId: decisions.map(({ id }) => id) },
    order: ['signedAt'],
  });
  const decisionOf = new Map(decisions.map((decision) => [decision.lotId, decision]));
  return rows.map((row) => {
    const decision = decisionOf.get(row.id);
    return {
      ...row,
      decision: decision?.decision ?? null,
      signatures: decision ? signatures.filter((s) => s.recordId === decision.id) : [],
    };
  });
}

async function* allLots(filter: Filter): AsyncGenerator<SignedLot[]> {
  const cursorOf = lotCursor(filter.sort);
  let after: string | undefined;
  for (;;) {
    const rows = await queryLots(filter, batch, after);
    if (rows.length > 0) yield await withSignatures(rows);
    if (rows.length < batch) return;
    after = encodeCursor(cursorOf(rows.at(-1)!));
  }
}

/** Every lot of the filter in the order of the list, not only the page that is seen. */
export function writeLotsCsv(filter: Filter, response: Response): Promise<void> {
  return writeCsv(
    response,
    `quartzhold-lots-${new Date().toISOString().slice(0, 10)}.csv`,
    columns,
    allLots(filter),
  );
}
