import { type Response } from 'express';
import { type HistoryEntry } from '@shared/contract/history';
import { presentHistoryEntry } from '../../presenters/history';
import { writeCsv, type CsvColumn } from '../../reports/csv';
import { historyRows } from './export-history';
import { type Filter } from './history-query';

const columns: CsvColumn<HistoryEntry>[] = [
  { header: 'sequence', kind: 'number', value: (e) => e.sequence },
  { header: 'at', kind: 'text', value: (e) => e.at },
  { header: 'person', kind: 'text', value: (e) => e.actor.name },
  { header: 'role', kind: 'text', value: (e) => e.actor.role },
  { header: 'act', kind: 'text', value: (e) => e.act },
  { header: 'record_type', kind: 'text', value: (e) => e.recordType },
  { header: 'record', kind: 'text', value: (e) => e.recordLabel || e.recordId },
  { header: 'before', kind: 'text', value: (e) => (e.before ? JSON.stringify(e.before) : '') },
  { header: 'after', kind: 'text', value: (e) => (e.after ? JSON.stringify(e.after) : '') },
  { header: 'reason', kind: 'text', value: (e) => e.reason },
  { header: 'previous_hash', kind: 'text', value: (e) => e.previousHash },
  { header: 'hash', kind: 'text', value: (e) => e.hash },
];

async function* entries(filter: Filter): AsyncGenerator<HistoryEntry[]> {
  for await (const rows of historyRows(filter)) yield rows.map(presentHistoryEntry);
}

export function writeHistoryCsv(filter: Filter, response: Response): Promise<void> {
  return writeCsv(
    response,
    `quartzhold-history-${new Date().toISOString().slice(0, 10)}.csv`,
    columns,
    entries(filter),
  );
}
