import { type Transaction } from 'sequelize';
import { Disposition, type Lot } from '../../models';

/** A concession of a held lot that came to nothing leaves the hold in force, as if it had never been proposed. */
export async function restoreHold(transaction: Transaction, lot: Lot): Promise<void> {
  if (lot.state !== 'on_hold') return;
  const hold = await Disposition.findOne({
    where: { lotId: lot.id, decision: 'hold' },
    order: [['number', 'DESC']],
    transaction,
  });
  if (hold?.state === 'superseded') await hold.update({ state: 'in_force' }, { transaction });
}
