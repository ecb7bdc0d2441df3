import { QueryTypes } from 'sequelize';
import { type z } from 'zod';
import { type ReadingFilter } from '@shared/contract/lots';
import { ON_LIMIT_PPM } from '@shared/decision/rule';
import { database } from '../../database/connection';
import { likePattern } from '../../database/keyset';
import { type Lot, PartRevision, Upload } from '../../models';

export interface ReadingRecord {
  upload_number: number;
  file_line: number;
  file_column: number;
  serial: string;
  temperature_c: string | null;
  frequency_hz: string;
  offset_ppm: number;
  measured_at: Date | null;
  measured_text: string | null;
  resistance_ohm: string | null;
  load_capacitance_pf: string | null;
  supply_v: string | null;
  drive_uw: string | null;
}
export type Filter = z.output<typeof ReadingFilter>;
export type Place = [uploadNumber: number, fileLine: number, fileColumn: number];

/** What a lot's readings are looked for by: the uploads that count, the part's nominal and limits, the receiver's allowance. */
export interface ReadingScope {
  lot: Lot;
  uploads: Upload[];
  nominalHz: string;
  limits: { lowPpm: number | null; highPpm: number | null };
}

export async function readingScope(lot: Lot, filter: Filter): Promise<ReadingScope> {
  const revision = (await PartRevision.findByPk(lot.partRevisionId))!;
  // A sub-lot stands on the readings of its parent.
  const lotIds = lot.parentLotId ? [lot.id, lot.parentLotId] : [lot.id];
  const uploads = await Upload.findAll({
    where: { lotId: lotIds, state: 'done', ...(filter.uploadId ? { id: filter.uploadId } : {}) },
    order: ['number'],
  });
  const { toleranceLowPpm, toleranceHighPpm, nominalFrequencyHz } = revision.criteria;
  const limits =
    filter.beyond === 'allowance'
      ? {
          lowPpm: lot.bandStrip?.allowanceLowPpm ?? null,
          highPpm: lot.bandStrip?.allowanceHighPpm ?? null,
        }
      : { lowPpm: toleranceLowPpm, highPpm: toleranceHighPpm };
  return { lot, uploads, nominalHz: nominalFrequencyHz, limits };
}

/** Rows of one upload are found by their place; a window of lines keeps a page of a large file from sorting all of it. */
const WINDOW_LINES = 8;

export async function queryReadings(
  scope: ReadingScope,
  filter: Filter,
  after: Place,
  limit: number,
): Promise<ReadingRecord[]> {
  const numbers = scope.uploads.map((upload) => upload.number).filter((n) => n >= after[0]);
  const narrow = !filter.serial && !filter.beyond && !scope.lot.parentLotId;
  const found: ReadingRecord[] = [];
  for (const number of numbers) {
    const from: Place = number === after[0] ? after : [number, 0, 0];
    const most = limit - found.length;
    let rows = narrow ? await select(scope, filter, number, from, most, WINDOW_LINES * most) : [];
    if (rows.length < most) rows = await select(scope, filter, number, from, most, null);
    found.push(...rows);
    if (found.length >= limit) break;
  }
  return found;
}

function select(
  scope: ReadingScope,
  filter: Filter,
  number: number,
  [, line, column]: Place,
  limit: number,
  windowLines: number | null,
): Promise<ReadingRecord[]> {
  const { lowPpm, highPpm } = scope.limits;
  const conditions = [
    'upload_number = :number',
    'file_line >= :line',
    '(file_line, file_column) > (:line, :column)',
  ];
  if (windowLines !== null) conditions.push('file_line <= :lastLine');
  if (filter.serial) conditions.push('serial LIKE :pattern');
  if (scope.lot.parentLotId)
    conditions.push('serial IN (SELECT serial FROM sub_lot_units WHERE lot_id = :lotId)');
  if (filter.beyond) {
    const sides = [
      ...(lowPpm === null
        ? []
        : ['frequency_hz < :nominal::numeric * (1 + :low::numeric / 1000000)']),
      ...(highPpm === null
        ? []
        : ['frequency_hz > :nominal::numeric * (1 + :high::numeric / 1000000)']),
    ];
    conditions.push(sides.length ? `(${sides.join(' OR ')})` : 'false');
  }
  return database().sequelize.query<ReadingRecord>(
    `SELECT upload_number, file_line, file_column, serial, temperature_c, frequency_hz,
       ((frequency_hz - :nominal::numeric) * 1000000 / :nominal::numeric)::float8 AS offset_ppm,
       measured_at, to_char(measured_at AT TIME ZONE 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"') AS measured_text,
       resistance_ohm, load_capacitance_pf, supply_v, drive_uw
     FROM readings WHERE ${conditions.join(' AND ')}
     ORDER BY file_line, file_column LIMIT :limit`,
    {
      replacements: {
        number,
        line,
        column,
        lastLine: line + (windowLines ?? 0),
        pattern: filter.serial ? likePattern(filter.serial).slice(1) : '',
        lotId: scope.lot.id,
        nominal: scope.nominalHz,
        // A value on a limit conforms, as everywhere.
        low: lowPpm === null ? null : lowPpm - ON_LIMIT_PPM,
        high: highPpm === null ? null : highPpm + ON_LIMIT_PPM,
        limit,
      },
      type: QueryTypes.SELECT,
    },
  );
}
