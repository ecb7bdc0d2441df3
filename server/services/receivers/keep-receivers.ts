import { type ReceiverCriteria } from '@shared/contract/receivers';
import { type Transaction } from 'sequelize';
import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { ChangedMeanwhile, Conflict, InvalidInput, NotFound } from '../../http/errors';
import { Part, Receiver, ReceiverPart } from '../../models';
import { createDraft } from '../revisions/draft-revision';

interface Fields {
  name: string;
  description: string;
  active: boolean;
  partIds?: string[];
}

async function refuseTakenName(transaction: Transaction, name: string, exceptId?: string) {
  const twin = await Receiver.findOne({
    where: Receiver.sequelize!.where(
      Receiver.sequelize!.fn('lower', Receiver.sequelize!.col('name')),
      name.toLowerCase(),
    ),
    transaction,
  });
  if (twin && twin.id !== exceptId)
    throw new Conflict('receiver.exists', `Receiver ${twin.name} exists already.`, {
      name: 'This name exists already.',
    });
}

/** Replaces which parts the receiver uses; left alone when not given. */
async function useParts(
  transaction: Transaction,
  receiverId: string,
  partIds: string[] | undefined,
): Promise<void> {
  if (!partIds) return;
  const wanted = [...new Set(partIds)];
  if ((await Part.count({ where: { id: wanted }, transaction })) !== wanted.length) {
    throw new InvalidInput('One of the parts does not exist.', {
      partIds: 'One of these does not exist.',
    });
  }
  await ReceiverPart.destroy({ where: { receiverId }, transaction });
  await ReceiverPart.bulkCreate(
    wanted.map((partId) => ({ receiverId, partId })),
    { transaction },
  );
}

/** Act `receiver.add`: a receiver with its first revision as a draft. */
export function addReceiver(
  actor: Actor,
  input: Fields & { revision: string; changeNote: string; criteria: ReceiverCriteria },
): Promise<string> {
  return act(actor, 'receiver.add', async (transaction) => {
    const { partIds, revision, changeNote, criteria, ...fields } = input;
    await refuseTakenName(transaction, fields.name);
    const receiver = await Receiver.create(fields, { transaction });
    await useParts(transaction, receiver.id, partIds);
    const draft = await createDraft(transaction, 'receiver', actor, receiver.id, {
      revision,
      changeNote,
      criteria,
    });
    return {
      result: receiver.id,
      entry: {
        recordType: 'receiver',
        recordId: receiver.id,
        after: { ...input, revisionId: draft.id },
      },
    };
  });
}

/** Act `receiver.change`: what it is called and which parts it uses; never what it tolerates. */
export function changeReceiver(
  actor: Actor,
  id: string,
  input: Fields & { version: number },
): Promise<void> {
  return act(actor, 'receiver.change', async (transaction) => {
    const receiver = await Receiver.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
    if (!receiver) throw new NotFound('This receiver');
    if (receiver.version !== input.version) throw new ChangedMeanwhile();
    const { partIds, version, ...fields } = input;
    await refuseTakenName(transaction, fields.name, id);
    const links = await ReceiverPart.findAll({ where: { receiverId: id }, transaction });
    const before = {
      name: receiver.name,
      description: receiver.description,
      active: receiver.active,
      partIds: links.map((link) => link.partId).sort(),
    };
    await receiver.update({ ...fields, version: version + 1 }, { transaction });
    await useParts(transaction, id, partIds);
    return {
      result: undefined,
      entry: {
        recordType: 'receiver',
        recordId: id,
        before,
        after: { ...fields, partIds: partIds ? [...partIds].sort() : before.partIds },
      },
    };
  });
}
