import { type Actor } from '../../http/actor';
import { Conflict, InvalidInput, NotFound } from '../../http/errors';
import { act } from '../../history/act';
import { type PartRevision } from '../../models';
import { mayTakeEffect } from '../../policies/revisions';
import { proveSigner } from '../signing/prove-signer';
import { sign } from '../signing/sign';
import { judgeDraftLotsAnew } from './judge-draft-lots-anew';
import { revisedKinds, type RevisedKind } from './kinds';

export interface Approval {
  password: string;
  reason: string;
  effectiveFrom: string;
}

/** Act `part.revision.approve`: a quality engineer signs the revision and fixes the day from which it counts. */
export async function approveRevision(
  kind: RevisedKind,
  actor: Actor,
  ownerId: string,
  revisionId: string,
  approval: Approval,
): Promise<void> {
  const { Revision, ownerKey, recordType } = revisedKinds[kind];
  await proveSigner(actor, approval.password);
  await act(actor, `${kind}.revision.approve`, async (transaction) => {
    const siblings = await (Revision as typeof PartRevision).findAll({
      where: { [ownerKey]: ownerId } as never,
      transaction,
      lock: transaction.LOCK.UPDATE,
    });
    const revision = siblings.find((sibling) => sibling.id === revisionId);
    if (!revision) throw new NotFound('This revision');
    if (revision.state !== 'draft')
      throw new Conflict('revision.approved', 'This revision is approved already.');
    const today = new Date().toISOString().slice(0, 10);
    if (!mayTakeEffect(siblings, approval.effectiveFrom, today)) {
      const text =
        'A revision takes effect today or later: past lots keep the rule that was in force when they came.';
      throw new InvalidInput(text, { effectiveFrom: text }, 'revision.backdated');
    }
    const content = {
      ownerId,
      revision: revision.revision,
      changeNote: revision.changeNote,
      criteria: revision.criteria,
      effectiveFrom: approval.effectiveFrom,
    };
    const signature = await sign(transaction, {
      actor,
      recordType,
      recordId: revision.id,
      recordVersion: revision.version,
      meaning: 'approval of criteria',
      reason: approval.reason,
      content,
    });
    revision.set({
      state: 'approved',
      effectiveFrom: approval.effectiveFrom,
      approvalSignatureId: signature.id,
    });
    await revision.save({ transaction });
    await judgeDraftLotsAnew(transaction, kind, revision.id);
    return {
      result: undefined,
      entry: {
        recordType,
        recordId: revision.id,
        reason: approval.reason,
        before: { state: 'draft' },
        after: {
          state: 'approved',
          effectiveFrom: approval.effectiveFrom,
          signatureId: signature.id,
          contentHash: signature.contentHash,
        },
      },
    };
  });
}
