import { REFERENCE_WINDOW_K } from '@shared/analysis/units';
import { unitVerdict } from '@shared/decision/unit-verdict';
import { decodeCursor, page } from '../../database/keyset';
import { NotFound } from '../../http/errors';
import { Lot, PartRevision } from '../../models';
import { type Filter, type Place, queryReadings, readingScope } from './reading-query';

const verdictNames = {
  conforming: 'conforming',
  notProven: 'not_proven',
  nonconforming: 'nonconforming',
} as const;

/** Readings of a lot in the order of its files, each with its offset and its verdict under the part's decision rule. */
export async function listReadings(
  lotId: string,
  query: Filter & { after?: string; limit: number },
) {
  const lot = await Lot.findByPk(lotId);
  if (!lot) throw new NotFound('This lot');
  const revision = (await PartRevision.findByPk(lot.partRevisionId))!;
  const { decisionRule, toleranceLowPpm, toleranceHighPpm, referenceTemperatureC } =
    revision.criteria;
  const scope = await readingScope(lot, query);
  const after = query.after ? (decodeCursor(query.after, 3).map(Number) as Place) : undefined;
  const rows = await queryReadings(scope, query, after ?? [0, 0, -1], query.limit + 1);
  const uploadOf = new Map(scope.uploads.map((upload) => [upload.number, upload]));
  return page(
    rows,
    query.limit,
    (row) => {
      const upload = uploadOf.get(row.upload_number)!;
      const { outcome } = unitVerdict(
        row.offset_ppm,
        { lowPpm: toleranceLowPpm, highPpm: toleranceHighPpm },
        decisionRule,
        upload.benchUncertaintyPpm ?? 0,
      );
      return {
        uploadId: upload.id,
        fileLine: row.file_line,
        serial: row.serial,
        temperatureC: row.temperature_c,
        frequencyHz: row.frequency_hz,
        offsetPpm: row.offset_ppm,
        measuredAt: row.measured_text,
        // The tolerance holds at the reference temperature only.
        verdict:
          Math.abs(Number(row.temperature_c ?? referenceTemperatureC) - referenceTemperatureC) <=
          REFERENCE_WINDOW_K
            ? verdictNames[outcome]
            : null,
      };
    },
    (row) => [row.upload_number, row.file_line, row.file_column],
  );
}
