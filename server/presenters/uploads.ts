import { type Upload as UploadView, Mapping } from '@shared/contract/uploads';
import { type Upload } from '../models';

export function presentUpload(upload: Upload): UploadView {
  const mapping = upload.mapping ? Mapping.safeParse(upload.mapping) : null;
  return {
    id: upload.id,
    lotId: upload.lotId,
    lotNumber: upload.lot?.lotNumber ?? '',
    fileName: upload.fileName,
    byteCount: Number(upload.byteCount),
    sha256: upload.sha256,
    state: upload.state,
    bench: upload.bench ? { id: upload.bench.id, name: upload.bench.name } : null,
    mapping: mapping?.success ? mapping.data : null,
    rowsInFile: upload.rowsInFile,
    rowsTaken: upload.rowsTaken,
    rowsRefused: upload.rowsRefused,
    unitsCount: upload.unitsCount,
    progress: {
      bytesRead: Number(upload.bytesRead),
      rowsPerSecond: upload.rowsPerSecond,
      secondsLeft: upload.secondsLeft,
      stage: upload.stage,
    },
    failure: upload.failure,
    warnings: upload.warnings,
    uploadedBy: upload.uploader ? { id: upload.uploader.id, name: upload.uploader.name } : null,
    createdAt: upload.createdAt.toISOString(),
    startedAt: upload.startedAt?.toISOString() ?? null,
    finishedAt: upload.finishedAt?.toISOString() ?? null,
    withdrawnAt: upload.withdrawnAt?.toISOString() ?? null,
    withdrawnReason: upload.withdrawnReason,
  };
}
