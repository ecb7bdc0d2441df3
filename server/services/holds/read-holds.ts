import { Op, type WhereOptions } from 'sequelize';
import { type QueryOf } from '@shared/contract/endpoint';
import { type HoldRow, type listHolds } from '@shared/contract/holds';
import { likePattern, page } from '../../database/keyset';
import { timeCursor } from '../../database/time-cursor';
import { type Actor } from '../../http/actor';
import { NotFound } from '../../http/errors';
import { Attachment, Hold, HoldMessage } from '../../models';
import { mayReadHold } from '../../policies/holds';
import { presentHold, presentHoldRow, type Turns } from '../../presenters/holds';

const context = [
  { association: 'lot', required: true, include: [{ association: 'part', required: true }] },
  { association: 'supplier', required: true },
];

/** Newest first. A supplier contact's list is cut to the own supplier in the query itself, so no count can leak. */
export async function readHolds(
  actor: Actor,
  query: QueryOf<typeof listHolds>,
): Promise<{ items: HoldRow[]; next: string | null }> {
  const where: WhereOptions[] = [];
  if (actor.role === 'supplier_contact') where.push({ supplierId: actor.supplierId! });
  if (query.state === 'not_closed') where.push({ state: { [Op.ne]: 'closed' } });
  else if (query.state) where.push({ state: query.state });
  if (query.find) {
    const like = { [Op.iLike]: likePattern(query.find) };
    where.push({
      [Op.or]: [
        { number: like },
        { '$lot.lot_number$': like },
        { '$lot.date_code$': like },
        { '$lot.part.part_number$': like },
        { '$supplier.name$': like },
      ],
    });
  }
  if (query.after) {
    const { at, id } = timeCursor(query.after);
    where.push({
      [Op.or]: [{ openedAt: { [Op.lt]: at } }, { openedAt: at, id: { [Op.gt]: id } }],
    });
  }
  const holds = await Hold.findAll({
    where: { [Op.and]: where },
    include: context,
    order: [
      ['openedAt', 'DESC'],
      ['id', 'ASC'],
    ],
    limit: query.limit + 1,
    subQuery: false,
  });
  const turns = await turnsOf(holds.map(({ id }) => id));
  const now = new Date();
  return page(
    holds,
    query.limit,
    (hold) => presentHoldRow(hold, turns.get(hold.id) ?? [], actor, now),
    (hold) => [hold.openedAt.toISOString(), hold.id],
  );
}

async function turnsOf(holdIds: string[]): Promise<Map<string, Turns>> {
  const messages = await HoldMessage.findAll({
    attributes: ['holdId', 'kind', 'side'],
    where: { holdId: holdIds, kind: ['question', 'reply', 'answer'] },
    order: [
      ['createdAt', 'ASC'],
      ['id', 'ASC'],
    ],
  });
  const turns = new Map<string, Turns>();
  for (const message of messages) {
    const list = turns.get(message.holdId) ?? [];
    list.push(message);
    turns.set(message.holdId, list);
  }
  return turns;
}

export async function readHold(actor: Actor, id: string) {
  const hold = await Hold.findByPk(id, { include: context });
  if (!hold || !mayReadHold(actor, hold)) throw new NotFound('This hold');
  hold.messages = await HoldMessage.findAll({
    where: { holdId: id },
    include: [
      { association: 'author', attributes: ['name'] },
      { association: 'attachments', attributes: { exclude: ['bytes'] } },
    ],
    order: [
      ['createdAt', 'ASC'],
      ['id', 'ASC'],
      [{ model: Attachment, as: 'attachments' }, 'fileName', 'ASC'],
    ],
  });
  return presentHold(hold, actor);
}

export async function readAttachment(actor: Actor, holdId: string, attachmentId: string) {
  const hold = await Hold.findByPk(holdId, { attributes: ['id', 'supplierId'] });
  if (!hold || !mayReadHold(actor, hold)) throw new NotFound('This file');
  const attachment = await Attachment.findByPk(attachmentId);
  const message = attachment && (await HoldMessage.findByPk(attachment.holdMessageId));
  if (!attachment || message?.holdId !== holdId) throw new NotFound('This file');
  return attachment;
}
