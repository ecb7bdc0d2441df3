import { Op, type WhereOptions } from 'sequelize';
import { type QueryOf } from '@shared/contract/endpoint';
import { type listBenches } from '@shared/contract/benches';
import { decodeCursor, likePattern, page } from '../../database/keyset';
import { NotFound } from '../../http/errors';
import { Bench } from '../../models';
import { presentBench } from '../../presenters/bench';

export async function readBench(id: string) {
  const bench = await Bench.findByPk(id);
  if (!bench) throw new NotFound('This bench');
  return presentBench(bench);
}

/** By name. */
export async function readBenches(query: QueryOf<typeof listBenches>) {
  const where: WhereOptions[] = [];
  if (query.find) {
    const pattern = { [Op.iLike]: likePattern(query.find) };
    where.push({ [Op.or]: [{ name: pattern }, { counter: pattern }, { location: pattern }] });
  }
  if (query.after) {
    const [name, id] = decodeCursor(query.after, 2) as [string, string];
    where.push({ [Op.or]: [{ name: { [Op.gt]: name } }, { name, id: { [Op.gt]: id } }] });
  }
  const benches = await Bench.findAll({
    where: { [Op.and]: where },
    order: ['name', 'id'],
    limit: query.limit + 1,
  });
  return page(benches, query.limit, presentBench, (bench) => [bench.name, bench.id]);
}
