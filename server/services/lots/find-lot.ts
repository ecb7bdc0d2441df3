import { col, fn, where, type Transaction } from 'sequelize';
import { NotFound } from '../../http/errors';
import { Lot } from '../../models';

/** Lot numbers are told apart without regard to case, as people write them. */
export function findLotByNumber(lotNumber: string, transaction?: Transaction): Promise<Lot | null> {
  return Lot.findOne({
    where: where(fn('lower', col('lot_number')), lotNumber.toLowerCase()),
    transaction,
  });
}

/**
 * Takes the lot for change: whoever comes second waits, and then sees what the first one did. The lock leaves the key
 * free, because an upload that is still arriving holds on to it and must hold nobody up.
 */
export async function lockLot(id: string, transaction: Transaction): Promise<Lot> {
  const lot = await Lot.findByPk(id, { transaction, lock: transaction.LOCK.NO_KEY_UPDATE });
  if (!lot) throw new NotFound('This lot');
  return lot;
}
