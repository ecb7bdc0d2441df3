import { Op, type Transaction } from 'sequelize';
import { type z } from 'zod';
import { type BenchFields } from '@shared/contract/benches';
import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { ChangedMeanwhile, Conflict, InvalidInput, NotFound } from '../../http/errors';
import { Bench } from '../../models';
import { whyNotChamber } from '../../policies/benches';

type Fields = z.output<typeof BenchFields>;

async function refuseUnfit(transaction: Transaction, fields: Fields, exceptId?: string) {
  const chamber = whyNotChamber(fields);
  if (chamber) throw new InvalidInput(chamber, { chamberHighC: chamber });
  if (fields.usual && !fields.active) {
    const text = 'A bench that is out of use cannot be the usual one.';
    throw new InvalidInput(text, { usual: text });
  }
  const twin = await Bench.findOne({
    where: Bench.sequelize!.where(
      Bench.sequelize!.fn('lower', Bench.sequelize!.col('name')),
      fields.name.toLowerCase(),
    ),
    transaction,
  });
  if (twin && twin.id !== exceptId)
    throw new Conflict('bench.exists', `${twin.name} exists already.`, {
      name: 'A bench of this name exists already.',
    });
}

/** One bench is the usual one: naming another takes it from the last. Tells which that was. */
async function takeUsual(transaction: Transaction, id: string | null): Promise<string | undefined> {
  const last = await Bench.findOne({
    where: { usual: true, ...(id ? { id: { [Op.ne]: id } } : {}) },
    transaction,
    lock: transaction.LOCK.UPDATE,
  });
  await last?.update({ usual: false, version: last.version + 1 }, { transaction });
  return last?.id;
}

/** Act `bench.add` */
export function addBench(actor: Actor, fields: Fields): Promise<string> {
  return act(actor, 'bench.add', async (transaction) => {
    await refuseUnfit(transaction, fields);
    const usualBefore = fields.usual ? await takeUsual(transaction, null) : undefined;
    const bench = await Bench.create(fields, { transaction });
    return {
      result: bench.id,
      entry: { recordType: 'bench', recordId: bench.id, after: { ...fields, usualBefore } },
    };
  });
}

/** Act `bench.change`: uploads made before keep the uncertainty they were made with. */
export function changeBench(
  actor: Actor,
  id: string,
  input: Fields & { version: number },
): Promise<void> {
  return act(actor, 'bench.change', async (transaction) => {
    const bench = await Bench.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
    if (!bench) throw new NotFound('This bench');
    if (bench.version !== input.version) throw new ChangedMeanwhile();
    const { version, ...fields } = input;
    await refuseUnfit(transaction, fields, id);
    const before = Object.fromEntries(
      Object.keys(fields).map((name) => [name, bench.get(name as keyof Fields) as unknown]),
    );
    const usualBefore = fields.usual ? await takeUsual(transaction, id) : undefined;
    await bench.update({ ...fields, version: version + 1 }, { transaction });
    return {
      result: undefined,
      entry: { recordType: 'bench', recordId: id, before, after: { ...fields, usualBefore } },
    };
  });
}
