import { type z } from 'zod';
import { type PartCriteria, type PartFields } from '@shared/contract/parts';
import { type Transaction } from 'sequelize';
import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { ChangedMeanwhile, Conflict, InvalidInput, NotFound } from '../../http/errors';
import { Part, Receiver, ReceiverPart } from '../../models';
import { createDraft } from '../revisions/draft-revision';

type Fields = z.output<typeof PartFields>;

async function refuseTakenNumber(transaction: Transaction, partNumber: string, exceptId?: string) {
  const twin = await Part.findOne({
    where: Part.sequelize!.where(
      Part.sequelize!.fn('lower', Part.sequelize!.col('part_number')),
      partNumber.toLowerCase(),
    ),
    transaction,
  });
  if (twin && twin.id !== exceptId)
    throw new Conflict('part.exists', `Part ${twin.partNumber} exists already.`, {
      partNumber: 'This part number exists already.',
    });
}

/** Replaces which receivers use the part. */
async function useReceivers(
  transaction: Transaction,
  partId: string,
  receiverIds: string[],
): Promise<void> {
  const wanted = [...new Set(receiverIds)];
  const known = await Receiver.count({ where: { id: wanted }, transaction });
  if (known !== wanted.length)
    throw new InvalidInput('One of the receivers does not exist.', {
      receiverIds: 'One of these does not exist.',
    });
  await ReceiverPart.destroy({ where: { partId }, transaction });
  await ReceiverPart.bulkCreate(
    wanted.map((receiverId) => ({ receiverId, partId })),
    { transaction },
  );
}

/** Act `part.add`: a part with its first revision as a draft. */
export function addPart(
  actor: Actor,
  input: Fields & { revision: string; changeNote: string; criteria: PartCriteria },
): Promise<string> {
  return act(actor, 'part.add', async (transaction) => {
    const { receiverIds, revision, changeNote, criteria, ...fields } = input;
    await refuseTakenNumber(transaction, fields.partNumber);
    const part = await Part.create(fields, { transaction });
    await useReceivers(transaction, part.id, receiverIds);
    const draft = await createDraft(transaction, 'part', actor, part.id, {
      revision,
      changeNote,
      criteria,
    });
    return {
      result: part.id,
      entry: { recordType: 'part', recordId: part.id, after: { ...input, revisionId: draft.id } },
    };
  });
}

/** Act `part.change`: what it is called and which receivers use it; never what it must meet. */
export function changePart(
  actor: Actor,
  id: string,
  input: Fields & { version: number },
): Promise<void> {
  return act(actor, 'part.change', async (transaction) => {
    const part = await Part.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
    if (!part) throw new NotFound('This part');
    if (part.version !== input.version) throw new ChangedMeanwhile();
    const { receiverIds, version, ...fields } = input;
    await refuseTakenNumber(transaction, fields.partNumber, id);
    const links = await ReceiverPart.findAll({ where: { partId: id }, transaction });
    const before = {
      partNumber: part.partNumber,
      deviceKind: part.deviceKind,
      description: part.description,
      active: part.active,
      receiverIds: links.map((link) => link.receiverId).sort(),
    };
    await part.update({ ...fields, version: version + 1 }, { transaction });
    await useReceivers(transaction, id, receiverIds);
    return {
      result: undefined,
      entry: {
        recordType: 'part',
        recordId: id,
        before,
        after: { ...fields, receiverIds: [...receiverIds].sort() },
      },
    };
  });
}
