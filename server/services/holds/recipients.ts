import { type Transaction } from 'sequelize';
import { Person } from '../../models';

/** Everybody at the supplier who can sign in now. */
export function activeContacts(transaction: Transaction, supplierId: string): Promise<Person[]> {
  return Person.findAll({
    where: { supplierId, role: 'supplier_contact', state: 'active' },
    order: [['email', 'ASC']],
    transaction,
  });
}

/** Everybody who may decide on the lot; whoever signed the hold is among them while they are active. */
export function activeQualityEngineers(transaction: Transaction): Promise<Person[]> {
  return Person.findAll({
    where: { role: 'quality_engineer', state: 'active' },
    order: [['email', 'ASC']],
    transaction,
  });
}
