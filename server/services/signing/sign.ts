import { UniqueConstraintError, type Transaction } from 'sequelize';
import { canonicalJson, sha256Hex } from '../../history/canonical';
import { type Actor } from '../../http/actor';
import { Conflict, NotAllowed } from '../../http/errors';
import { Person, Signature } from '../../models';

export interface ToSign {
  actor: Actor;
  recordType: string;
  recordId: string;
  recordVersion: number;
  meaning: string;
  reason: string;
  /** What the signer saw; kept word for word. */
  content: object;
}

/** 409: one person signs one version of a record once for one meaning. */
export class SignedAlready extends Conflict {
  constructor() {
    super('signature.exists', 'You have signed this version already.');
  }
}

/**
 * Writes a signature in the transaction of its act, after `proveSigner`. Name and role come from the database and the
 * time from the server. The hash covers content, signer, record, version, meaning, reason and time together, so that a
 * signature cannot be cut out and put on another record.
 */
export async function sign(transaction: Transaction, toSign: ToSign): Promise<Signature> {
  const { actor, content, recordType, recordId, recordVersion, meaning, reason } = toSign;
  const signer = await Person.findByPk(actor.id, { transaction });
  if (actor.kind !== 'person' || !signer || signer.state !== 'active')
    throw new NotAllowed('Only a person with an active account can sign.');
  const signed = {
    personId: signer.id,
    printedName: signer.name,
    role: signer.role,
    meaning,
    reason,
    recordType,
    recordId,
    recordVersion,
    contentText: canonicalJson(content),
    signedAt: new Date(),
    zone: Intl.DateTimeFormat().resolvedOptions().timeZone,
  };
  try {
    return await Signature.create(
      { ...signed, contentHash: signatureHash(signed) },
      { transaction },
    );
  } catch (error) {
    if (error instanceof UniqueConstraintError) throw new SignedAlready();
    throw error;
  }
}

type Signed = Pick<
  Signature,
  | 'personId'
  | 'printedName'
  | 'role'
  | 'meaning'
  | 'reason'
  | 'recordType'
  | 'recordId'
  | 'recordVersion'
  | 'contentText'
  | 'signedAt'
  | 'zone'
>;

/** SHA-256 (hex) of canonical JSON of the content and everything that ties it to its signer, record and moment. */
export function signatureHash(signed: Signed): string {
  return sha256Hex(
    canonicalJson({
      content: JSON.parse(signed.contentText) as unknown,
      signerId: signed.personId,
      printedName: signed.printedName,
      role: signed.role,
      recordType: signed.recordType,
      recordId: signed.recordId,
      recordVersion: signed.recordVersion,
      meaning: signed.meaning,
      reason: signed.reason,
      signedAt: signed.signedAt,
      zone: signed.zone,
    }),
  );
}

/** True when nothing of the signature has changed since it was made. */
export function verifySignature(signature: Signed & Pick<Signature, 'contentHash'>): boolean {
  return (
    canonicalJson(JSON.parse(signature.contentText)) === signature.contentText &&
    signatureHash(signature) === signature.contentHash
  );
}
