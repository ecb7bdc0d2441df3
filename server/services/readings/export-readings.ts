import { type Response } from 'express';
import { NotFound } from '../../http/errors';
import { plainHeadings } from '../../ingest/propose/propose-mapping';
import { Lot } from '../../models';
import { type CsvColumn, writeCsv } from '../../reports/csv';
import {
  type Filter,
  type Place,
  queryReadings,
  type ReadingRecord,
  readingScope,
  type ReadingScope,
} from './reading-query';

const BATCH = 5000;

const plain: CsvColumn<ReadingRecord>[] = [
  { header: plainHeadings[0]!, kind: 'text', value: (row) => row.serial },
  { header: plainHeadings[1]!, kind: 'number', value: (row) => row.temperature_c },
  { header: plainHeadings[2]!, kind: 'number', value: (row) => row.frequency_hz },
  { header: plainHeadings[3]!, kind: 'text', value: (row) => row.measured_text },
];
const extras: Record<string, CsvColumn<ReadingRecord>> = {
  resistance: { header: 'resistance_ohm', kind: 'number', value: (row) => row.resistance_ohm },
  loadCapacitance: {
    header: 'load_capacitance_pf',
    kind: 'number',
    value: (row) => row.load_capacitance_pf,
  },
  supplyVoltage: { header: 'supply_v', kind: 'number', value: (row) => row.supply_v },
  driveLevel: { header: 'drive_uw', kind: 'number', value: (row) => row.drive_uw },
};

/** Readings in the plain form that uploads again as it is; further columns only where an upload had them. */
export async function exportReadings(
  lotId: string,
  filter: Filter,
  response: Response,
): Promise<void> {
  const lot = await Lot.findByPk(lotId);
  if (!lot) throw new NotFound('This lot');
  const scope = await readingScope(lot, filter);
  const mapped = new Set(
    scope.uploads.flatMap((upload) => upload.mapping?.columns.map((column) => column.target) ?? []),
  );
  const columns = [
    ...plain,
    ...Object.entries(extras).flatMap(([target, column]) =>
      mapped.has(target as never) ? [column] : [],
    ),
  ];
  await writeCsv(
    response,
    `readings-${lot.lotNumber.replace(/[^\w.-]+/g, '_')}.csv`,
    columns,
    batches(scope, filter),
  );
}

async function* batches(scope: ReadingScope, filter: Filter): AsyncGenerator<ReadingRecord[]> {
  let after: Place = [0, 0, -1];
  for (;;) {
    const rows = await queryReadings(scope, filter, after, BATCH);
    if (rows.length) yield rows;
    if (rows.length < BATCH) return;
    const last = rows.at(-1)!;
    after = [last.upload_number, last.file_line, last.file_column];
  }
}
