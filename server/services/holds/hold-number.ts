import { type Transaction } from 'sequelize';
import { Hold, type Lot } from '../../models';

/**
 * Named after the lot: `HOLD-L-2611-084`, the second one of the same lot `…-2`. Never counted over all lots, because a
 * running number would tell a supplier how many others are held. Only letters, digits and `.-_` are taken over, so that
 * the name can stand in the subject of a mail.
 */
export async function holdNumber(transaction: Transaction, lot: Lot): Promise<string> {
  const base = `HOLD-${plain(lot.lotNumber) || lot.id.slice(0, 8)}`;
  const earlier = await Hold.count({ where: { lotId: lot.id }, transaction });
  const wanted = earlier === 0 ? base : `${base}-${earlier + 1}`;
  const taken = await Hold.count({ where: { number: wanted }, transaction });
  // Two lot numbers can look alike once cleaned; the lot's own id tells them apart without counting.
  return taken === 0
    ? wanted
    : `${base}-${lot.id.slice(0, 8)}${earlier === 0 ? '' : `-${earlier + 1}`}`;
}

function plain(lotNumber: string): string {
  return lotNumber
    .replace(/[^A-Za-z0-9._-]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 60);
}
