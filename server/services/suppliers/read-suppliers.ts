import { Op, QueryTypes, type WhereOptions } from 'sequelize';
import { type QueryOf } from '@shared/contract/endpoint';
import { type listSuppliers } from '@shared/contract/suppliers';
import { database } from '../../database/connection';
import { decodeCursor, likePattern, page } from '../../database/keyset';
import { NotFound } from '../../http/errors';
import { Person, Supplier } from '../../models';
import { presentSupplier, type SupplierCounts } from '../../presenters/supplier';

const withContacts = [{ model: Person, as: 'contacts', separate: true, order: ['name', 'id'] }];

async function countsOf(ids: string[]): Promise<Map<string, SupplierCounts>> {
  if (ids.length === 0) return new Map();
  const rows = await database().sequelize.query<{ id: string; lots: string; holds: string }>(
    `SELECT suppliers.id,
            (SELECT count(*) FROM lots WHERE lots.supplier_id = suppliers.id) AS lots,
            (SELECT count(*) FROM holds WHERE holds.supplier_id = suppliers.id AND holds.state <> 'closed') AS holds
     FROM suppliers WHERE suppliers.id IN (:ids)`,
    { replacements: { ids }, type: QueryTypes.SELECT },
  );
  return new Map(
    rows.map((row) => [row.id, { lots: Number(row.lots), openHolds: Number(row.holds) }]),
  );
}

export async function readSupplier(id: string) {
  const supplier = await Supplier.findByPk(id, { include: withContacts as never });
  if (!supplier) throw new NotFound('This supplier');
  return presentSupplier(supplier, (await countsOf([id])).get(id));
}

/** By name. */
export async function readSuppliers(query: QueryOf<typeof listSuppliers>) {
  const where: WhereOptions[] = [];
  if (query.find) {
    const pattern = { [Op.iLike]: likePattern(query.find) };
    where.push({ [Op.or]: [{ name: pattern }, { location: pattern }] });
  }
  if (query.active) where.push({ active: query.active === 'true' });
  if (query.after) {
    const [name, id] = decodeCursor(query.after, 2) as [string, string];
    where.push({ [Op.or]: [{ name: { [Op.gt]: name } }, { name, id: { [Op.gt]: id } }] });
  }
  const suppliers = await Supplier.findAll({
    where: { [Op.and]: where },
    include: withContacts as never,
    order: ['name', 'id'],
    limit: query.limit + 1,
  });
  const counts = await countsOf(suppliers.map((supplier) => supplier.id));
  return page(
    suppliers,
    query.limit,
    (supplier) => presentSupplier(supplier, counts.get(supplier.id)),
    (supplier) => [supplier.name, supplier.id],
  );
}
