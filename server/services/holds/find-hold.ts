import { type Transaction } from 'sequelize';
import { type Actor } from '../../http/actor';
import { Conflict, NotAllowed, NotFound } from '../../http/errors';
import { Hold, Lot, Supplier } from '../../models';
import { mayReadHold } from '../../policies/holds';
import { type HoldInContext } from './tell';

/** The hold, locked for an act; another supplier's hold does not exist for a contact. */
export async function lockHold(
  transaction: Transaction,
  actor: Actor,
  id: string,
): Promise<HoldInContext> {
  const hold = await Hold.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
  if (!hold || !mayReadHold(actor, hold)) throw new NotFound('This hold');
  const lot = (await Lot.findByPk(hold.lotId, { transaction }))!;
  const supplier = (await Supplier.findByPk(hold.supplierId, { transaction }))!;
  return { hold, lot, supplier };
}

/** Why an act is refused by the state the hold is in; otherwise it is the person. */
export function refuse(hold: Hold, act: 'acknowledge' | 'answer' | 'write'): never {
  if (hold.state === 'closed')
    throw new Conflict(
      'hold.closed',
      'This hold is closed: the second decision is signed. Nothing can be added.',
    );
  if (act === 'acknowledge' && hold.state !== 'open')
    throw new Conflict('hold.acknowledged', 'This hold is acknowledged already.');
  if (act === 'answer' && hold.state === 'open')
    throw new Conflict('hold.not_acknowledged', 'Acknowledge the notice first, then answer.');
  throw new NotAllowed();
}
