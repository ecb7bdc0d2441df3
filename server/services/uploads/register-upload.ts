import { type Transaction } from 'sequelize';
import { type z } from 'zod';
import { Mapping, type UploadWarning } from '@shared/contract/uploads';
import { record } from '../../history/act';
import { InvalidInput } from '../../http/errors';
import { enqueue } from '../../jobs/boss';
import { queues } from '../../jobs/queues';
import { Upload } from '../../models';
import { lockLot } from '../lots/find-lot';
import { refuseClosedLot } from './admit';
import { benchState, chooseBench } from './choose-bench';
import { decideMapping } from './decide-mapping';
import { checkQuota } from './quota';
import { type Admission, type ReceivedFile } from './receive-file';
import { sameFileConflict, uploadsOfContent } from './same-file';

export interface UploadFields {
  benchId?: string;
  mapping?: string;
  rememberMapping?: 'true' | 'false';
  acceptWarnings?: 'true' | 'false';
}

/**
 * Ends the receipt of a file: its row, its bytes, the history entry and the job that reads it are committed together, or
 * none of them is.
 */
export async function registerUpload(
  file: ReceivedFile,
  { lot, actor, benchTokenId }: Admission,
  fields: UploadFields,
): Promise<{ id: string }> {
  const { transaction, uploadId } = file;
  const { mapping, headings } = await decideMapping(file.prefix, lot, parseMapping(fields.mapping));
  // From here on the lot is locked: two equal files at once, the second waits and is recognised.
  const locked = await lockLot(lot.id, transaction);
  refuseClosedLot(actor, locked);
  await checkQuota(
    { personId: actor.kind === 'person' ? actor.id : null, benchTokenId },
    file.byteCount,
    transaction,
  );
  const warnings = await checkSameFile(file, lot.id, transaction);
  const bench = await chooseBench(lot.id, fields.benchId, transaction);
  const values = {
    byteCount: String(file.byteCount),
    sha256: file.sha256,
    mapping,
    headings,
    rememberMapping: fields.rememberMapping === 'true',
    warnings,
    ...benchState(bench),
  };
  await Upload.update(values, { where: { id: uploadId }, transaction });
  await record(transaction, actor, 'upload.receive', {
    recordType: 'upload',
    recordId: uploadId,
    lotId: lot.id,
    before: null,
    after: {
      fileName: file.fileName,
      byteCount: file.byteCount,
      sha256: file.sha256,
      mapping,
      benchId: values.benchId,
      benchUncertaintyPpm: values.benchUncertaintyPpm,
      benchInCalibration: values.benchInCalibration,
      warningsSeen: fields.acceptWarnings === 'true',
    },
  });
  await enqueue(transaction, queues.ingest, { uploadId });
  await transaction.commit();
  return { id: uploadId };
}

async function checkSameFile(
  file: ReceivedFile,
  lotId: string,
  transaction: Transaction,
): Promise<z.infer<typeof UploadWarning>[]> {
  // The row of this upload carries no hash yet, so it does not find itself.
  const same = await uploadsOfContent(file.sha256, transaction, file.uploadId);
  const here = same.find((upload) => upload.lotId === lotId);
  if (here) throw sameFileConflict(here);
  const elsewhere = same[0];
  if (!elsewhere) return [];
  return [
    {
      code: 'file.other_lot',
      text: `The very same file was uploaded for lot ${elsewhere.lot?.lotNumber ?? ''} at ${elsewhere.createdAt.toISOString()}.`,
      column: null,
      cleared: false,
    },
  ];
}

export function parseMapping(text: string | undefined): Mapping | null {
  if (text === undefined || text.trim() === '') return null;
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch {
    throw new InvalidInput('The mapping is not readable JSON.', { mapping: 'Not JSON.' });
  }
  const parsed = Mapping.safeParse(value);
  if (parsed.success) return parsed.data;
  const [issue] = parsed.error.issues;
  throw new InvalidInput(`mapping: ${issue?.message ?? 'cannot be read.'}`, {
    mapping: `${issue?.path.join('.') ?? ''}: ${issue?.message ?? ''}`,
  });
}
