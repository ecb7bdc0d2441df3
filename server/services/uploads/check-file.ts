import { type UploadCheck } from '@shared/contract/uploads';
import { InvalidInput } from '../../http/errors';
import { FileRefused } from '../../ingest/errors';
import { exampleOf } from '../../ingest/propose/convert';
import { doubtsAbout } from '../../ingest/propose/plausibility';
import { proposeMapping } from '../../ingest/propose/propose-mapping';
import { type Lot } from '../../models';
import { chooseBench } from './choose-bench';
import { contentOf, nominalOf } from './decide-mapping';
import { safeFileName } from './receive-file';
import { parseMapping } from './register-upload';
import { uploaderName, uploadsOfContent } from './same-file';
import { type KnownMapping, savedMappingFor } from './saved-mappings';

const ROWS_SHOWN = 20;

/** Looks at the first bytes of a file and says how it would be read. Writes nothing. */
export async function checkFile(
  lot: Lot,
  prefix: Buffer,
  fields: { mapping?: string; sha256?: string; fileName?: string },
  attachedName: string,
): Promise<UploadCheck> {
  const content = contentOf(prefix);
  const nominalHz = await nominalOf(lot);
  let saved: KnownMapping | null = null;
  const proposal = await proposeMapping(content, nominalHz, {
    given: parseMapping(fields.mapping),
    known: async (headings) => {
      saved = await savedMappingFor(lot.supplierId, headings);
      return saved?.mapping ?? null;
    },
  }).catch((error: unknown) => {
    if (error instanceof FileRefused)
      throw new InvalidInput(error.message, { file: error.message }, error.code);
    throw error;
  });
  const { mapping, headings, records, questions } = proposal;
  const rows = records.map((record) => record.fields);
  const bench = await chooseBench(lot.id, undefined, undefined);
  const same = fields.sha256 ? (await uploadsOfContent(fields.sha256.toLowerCase()))[0] : undefined;
  const known = saved as KnownMapping | null;
  return {
    fileName: safeFileName(fields.fileName ?? attachedName),
    compression: content.compression,
    mapping,
    columns: mapping.columns.map((target, index) => {
      const samples = rows.map((row) => row[index] ?? '');
      return {
        index,
        header: headings?.[index] ?? '',
        target,
        samples: samples.slice(0, 5),
        example: exampleOf(samples, target, mapping, nominalHz),
      };
    }),
    rows: rows.slice(0, ROWS_SHOWN),
    firstLine: records[0]?.fileLine ?? 1,
    questions,
    warnings: doubtsAbout(rows, mapping, headings, {
      nominalHz,
      chamber: { lowC: bench?.chamberLowC ?? null, highC: bench?.chamberHighC ?? null },
    }),
    savedMapping: known && {
      version: known.version,
      savedAt: known.savedAt.toISOString(),
      savedBy: known.savedBy,
    },
    sameFile: same
      ? {
          uploadId: same.id,
          lotNumber: same.lot?.lotNumber ?? '',
          uploadedAt: same.createdAt.toISOString(),
          uploadedBy: uploaderName(same),
        }
      : null,
  };
}
