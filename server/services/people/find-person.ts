import { type Transaction } from 'sequelize';
import { ChangedMeanwhile, Conflict, InvalidInput, NotFound } from '../../http/errors';
import { Person, Supplier } from '../../models';

/** The person, locked for the rest of the transaction; the key stays free for files that they are still sending. */
export async function lockPerson(
  transaction: Transaction,
  id: string,
  version?: number,
): Promise<Person> {
  const person = await Person.findByPk(id, { transaction, lock: transaction.LOCK.NO_KEY_UPDATE });
  if (!person) throw new NotFound('This person');
  if (version !== undefined && person.version !== version) throw new ChangedMeanwhile();
  return person;
}

/** Locks all active administrators first, so that two of them cannot remove each other at the same moment. */
export async function countActiveAdministrators(transaction: Transaction): Promise<number> {
  const rows = await Person.findAll({
    attributes: ['id'],
    where: { role: 'administrator', state: 'active' },
    order: ['id'],
    transaction,
    lock: transaction.LOCK.NO_KEY_UPDATE,
  });
  return rows.length;
}

/** 409 when another account has or ever had the address; an address belongs to one person for ever. */
export async function refuseTakenEmail(
  transaction: Transaction,
  email: string,
  exceptId?: string,
): Promise<void> {
  const twin = await Person.findOne({
    where: Person.sequelize!.where(
      Person.sequelize!.fn('lower', Person.sequelize!.col('email')),
      email.toLowerCase(),
    ),
    transaction,
  });
  if (twin && twin.id !== exceptId) {
    const text =
      twin.state === 'disabled'
        ? `${twin.name} has this address and is disabled. An address is never given to another account; enable that one instead.`
        : `${twin.name} has this address already.`;
    throw new Conflict('person.exists', text, { email: text });
  }
}

export async function refuseUnknownSupplier(
  transaction: Transaction,
  supplierId: string | null,
): Promise<void> {
  if (supplierId === null || (await Supplier.findByPk(supplierId, { transaction }))) return;
  const text = 'This supplier does not exist.';
  throw new InvalidInput(text, { supplierId: text });
}
