import { Op, type WhereOptions } from 'sequelize';
import { type QueryOf } from '@shared/contract/endpoint';
import { type listReceivers } from '@shared/contract/receivers';
import { decodeCursor, likePattern, page } from '../../database/keyset';
import { NotFound } from '../../http/errors';
import { Part, Receiver, ReceiverRevision } from '../../models';
import { presentReceiver, presentReceiverWithRevisions } from '../../presenters/receiver';

const withRevisions = [
  { model: ReceiverRevision, as: 'revisions', separate: true, include: ['creator', 'approval'] },
  { model: Part, as: 'parts' },
];

export async function readReceiver(id: string) {
  const receiver = await Receiver.findByPk(id, { include: withRevisions });
  if (!receiver) throw new NotFound('This receiver');
  return presentReceiverWithRevisions(receiver);
}

export async function readReceivers(query: QueryOf<typeof listReceivers>) {
  const where: WhereOptions[] = [];
  if (query.find)
    where.push({
      [Op.or]: [
        { name: { [Op.iLike]: likePattern(query.find) } },
        { description: { [Op.iLike]: likePattern(query.find) } },
      ],
    });
  if (query.after) where.push({ name: { [Op.gt]: decodeCursor(query.after, 1)[0] } });
  const ids = await Receiver.findAll({
    attributes: ['id', 'name'],
    where: { [Op.and]: where },
    order: ['name'],
    limit: query.limit + 1,
  });
  const receivers = await Receiver.findAll({
    where: { id: ids.map((row) => row.id) },
    include: withRevisions,
    order: ['name'],
  });
  return page(receivers, query.limit, presentReceiver, (receiver) => [receiver.name]);
}
