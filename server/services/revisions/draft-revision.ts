import { type PartCriteria } from '@shared/contract/parts';
import { type ReceiverCriteria } from '@shared/contract/receivers';
import { type Transaction } from 'sequelize';
import { type Actor } from '../../http/actor';
import { ChangedMeanwhile, Conflict, NotFound } from '../../http/errors';
import { act } from '../../history/act';
import { PartRevision, ReceiverRevision } from '../../models';
import { judgeDraftLotsAnew } from './judge-draft-lots-anew';
import { revisedKinds, type RevisedKind } from './kinds';

export interface RevisionInput {
  revision: string;
  changeNote: string;
  criteria: PartCriteria | ReceiverCriteria;
}

/** Writes a draft row; the caller's act records it. */
export async function createDraft(
  transaction: Transaction,
  kind: RevisedKind,
  actor: Actor,
  ownerId: string,
  input: RevisionInput,
) {
  const common = { revision: input.revision, changeNote: input.changeNote, createdBy: actor.id };
  if (kind === 'part') {
    const criteria = input.criteria as PartCriteria;
    return PartRevision.create(
      { ...common, partId: ownerId, criteria, nominalFrequencyHz: criteria.nominalFrequencyHz },
      { transaction },
    );
  }
  return ReceiverRevision.create(
    { ...common, receiverId: ownerId, criteria: input.criteria as ReceiverCriteria },
    { transaction },
  );
}

async function refuseTakenName(
  transaction: Transaction,
  kind: RevisedKind,
  ownerId: string,
  revision: string,
  exceptId?: string,
) {
  const { Revision, ownerKey } = revisedKinds[kind];
  const twin = await (Revision as typeof PartRevision).findOne({
    where: { [ownerKey]: ownerId, revision } as never,
    transaction,
  });
  if (twin && twin.id !== exceptId) {
    throw new Conflict(
      'revision.exists',
      `Revision ${revision} exists already. Take the next letter or number.`,
      { revision: 'This revision exists already.' },
    );
  }
}

/** Act `part.revision.draft` or `receiver.revision.draft`. */
export function draftRevision(
  kind: RevisedKind,
  actor: Actor,
  ownerId: string,
  input: RevisionInput,
): Promise<void> {
  const { Owner, recordType, what } = revisedKinds[kind];
  return act(actor, `${kind}.revision.draft`, async (transaction) => {
    const owner = await (
      Owner as never as { findByPk(id: string, o: object): Promise<object | null> }
    ).findByPk(ownerId, { transaction });
    if (!owner) throw new NotFound(what);
    await refuseTakenName(transaction, kind, ownerId, input.revision);
    const revision = await createDraft(transaction, kind, actor, ownerId, input);
    return {
      result: undefined,
      entry: { recordType, recordId: revision.id, after: { ownerId, ...input } },
    };
  });
}

/** Act `part.revision.change`: a draft may change, an approved revision never. */
export function changeRevision(
  kind: RevisedKind,
  actor: Actor,
  ownerId: string,
  revisionId: string,
  input: RevisionInput & { version: number },
): Promise<void> {
  const { Revision, ownerKey, recordType } = revisedKinds[kind];
  return act(actor, `${kind}.revision.change`, async (transaction) => {
    const revision = await (Revision as typeof PartRevision).findOne({
      where: { id: revisionId, [ownerKey]: ownerId } as never,
      transaction,
      lock: transaction.LOCK.UPDATE,
    });
    if (!revision) throw new NotFound('This revision');
    if (revision.state !== 'draft')
      throw new Conflict(
        'revision.approved',
        'An approved revision never changes. Draft a new one.',
      );
    if (revision.version !== input.version) throw new ChangedMeanwhile();
    await refuseTakenName(transaction, kind, ownerId, input.revision, revision.id);
    const before = {
      revision: revision.revision,
      changeNote: revision.changeNote,
      criteria: revision.criteria,
    };
    const { version, ...after } = input;
    revision.set({
      revision: after.revision,
      changeNote: after.changeNote,
      criteria: after.criteria as PartCriteria,
      version: version + 1,
    });
    if (kind === 'part')
      revision.set('nominalFrequencyHz', (after.criteria as PartCriteria).nominalFrequencyHz);
    await revision.save({ transaction });
    await judgeDraftLotsAnew(transaction, kind, revision.id);
    return {
      result: undefined,
      entry: { recordType, recordId: revision.id, before, after: { ...after } },
    };
  });
}
