import { type SignatureView } from '@shared/contract/common';
import { type Signature } from '../models';

/** Name, time with zone, meaning, reason and hash: shown together wherever a signature is shown. */
export function presentSignature(signature: Signature): SignatureView {
  return {
    id: signature.id,
    person: { id: signature.personId, name: signature.printedName },
    role: signature.role,
    meaning: signature.meaning,
    reason: signature.reason,
    signedAt: signature.signedAt.toISOString(),
    zone: signature.zone,
    recordType: signature.recordType,
    recordId: signature.recordId,
    recordVersion: signature.recordVersion,
    contentHash: signature.contentHash,
  };
}
