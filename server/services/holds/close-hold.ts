import { type Transaction } from 'sequelize';
import { type Actor } from '../../http/actor';
import { Conflict, NotFound } from '../../http/errors';
import { Hold, HoldMessage, Lot, Supplier, type Disposition } from '../../models';
import { decisionWords } from './decision-words';
import { tellSupplier } from './tell';

export interface HoldClosing {
  holdId: string;
  /** The second decision. */
  disposition: Disposition;
  actor: Actor;
  /** What the supplier is told, in the signer's words. */
  text: string;
}

/** Ends the conversation with the second decision on the lot, as part of the act that signs it. */
export async function closeHold(transaction: Transaction, closing: HoldClosing): Promise<Hold> {
  const { holdId, disposition, actor, text } = closing;
  const hold = await Hold.findByPk(holdId, { transaction, lock: transaction.LOCK.UPDATE });
  if (!hold) throw new NotFound('This hold');
  if (hold.state === 'closed') throw new Conflict('hold.closed', 'This hold is closed already.');
  const lot = (await Lot.findByPk(hold.lotId, { transaction }))!;
  const supplier = (await Supplier.findByPk(hold.supplierId, { transaction }))!;
  await hold.update(
    {
      state: 'closed',
      closedAt: new Date(),
      closingDispositionId: disposition.id,
      version: hold.version + 1,
    },
    { transaction },
  );
  const decision = decisionWords(disposition);
  await HoldMessage.create(
    {
      holdId,
      kind: 'closing',
      authorId: actor.id,
      side: 'house',
      text: `${decision} ${text}`.trim(),
    },
    { transaction },
  );
  await tellSupplier(
    transaction,
    { hold, lot, supplier },
    {
      kind: 'hold.closing',
      subject: `${hold.number}: closed`,
      paragraphs: [`The hold is closed. ${decision}`, ...(text ? [text] : [])],
      facts: [
        ['Hold', hold.number],
        ['Lot', lot.lotNumber],
        ['Signed by', `${actor.name}, quality engineer`],
      ],
      linkLabel: 'Read the hold',
    },
  );
  return hold;
}
