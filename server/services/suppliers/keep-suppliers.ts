import { type Transaction } from 'sequelize';
import { type BodyOf } from '@shared/contract/endpoint';
import {
  type addSupplier as added,
  type changeSupplier as changed,
} from '@shared/contract/suppliers';
import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { ChangedMeanwhile, Conflict, NotFound } from '../../http/errors';
import { Supplier } from '../../models';

async function refuseTakenName(transaction: Transaction, name: string, exceptId?: string) {
  const twin = await Supplier.findOne({
    where: Supplier.sequelize!.where(
      Supplier.sequelize!.fn('lower', Supplier.sequelize!.col('name')),
      name.toLowerCase(),
    ),
    transaction,
  });
  if (twin && twin.id !== exceptId)
    throw new Conflict('supplier.exists', `${twin.name} exists already.`, {
      name: 'A supplier of this name exists already.',
    });
}

/** Act `supplier.add` */
export function addSupplier(actor: Actor, input: BodyOf<typeof added>): Promise<string> {
  return act(actor, 'supplier.add', async (transaction) => {
    const { name, location, notes, active } = input;
    await refuseTakenName(transaction, name);
    const supplier = await Supplier.create({ name, location, notes, active }, { transaction });
    return {
      result: supplier.id,
      entry: {
        recordType: 'supplier',
        recordId: supplier.id,
        after: { name, location, notes, active },
      },
    };
  });
}

/** Act `supplier.change` */
export function changeSupplier(
  actor: Actor,
  id: string,
  input: BodyOf<typeof changed>,
): Promise<void> {
  return act(actor, 'supplier.change', async (transaction) => {
    const supplier = await Supplier.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
    if (!supplier) throw new NotFound('This supplier');
    if (supplier.version !== input.version) throw new ChangedMeanwhile();
    const { version, ...after } = input;
    await refuseTakenName(transaction, after.name, id);
    const before = {
      name: supplier.name,
      location: supplier.location,
      notes: supplier.notes,
      active: supplier.active,
    };
    await supplier.update({ ...after, version: version + 1 }, { transaction });
    return { result: undefined, entry: { recordType: 'supplier', recordId: id, before, after } };
  });
}
