import { type Disposition as DispositionView } from '@shared/contract/dispositions';
import { type ConcessionFile, type Disposition, type Lot, type Signature } from '../models';
import { presentSignature } from './signature';

/** Expects `analysis` and `signer` loaded, and `sender` of the approvals. */
export function presentDisposition(
  disposition: Disposition,
  lot: Lot,
  signatures: Signature[],
  holdId: string | null,
  approvals: ConcessionFile[],
): DispositionView {
  return {
    id: disposition.id,
    lotId: disposition.lotId,
    number: disposition.number,
    decision: disposition.decision,
    reason: disposition.reason,
    state: disposition.state,
    treatment: disposition.treatment,
    concession: disposition.concession,
    correction: disposition.correction,
    analysisId: disposition.analysisId,
    analysisVersion: disposition.analysis!.version,
    signatures: signatures.map(presentSignature),
    contentHash: disposition.contentHash,
    current: disposition.dataVersion === lot.dataVersion,
    signedAt: disposition.signedAt.toISOString(),
    signedBy: { id: disposition.signedBy, name: disposition.signer?.name ?? '' },
    holdId,
    customerApprovals: approvals.map((file) => ({
      id: file.id,
      fileName: file.fileName,
      mediaType: file.mediaType,
      byteCount: file.byteCount,
      sha256: file.sha256,
      sentBy: { id: file.sentBy, name: file.sender?.name ?? '' },
      sentAt: file.sentAt.toISOString(),
    })),
  };
}
