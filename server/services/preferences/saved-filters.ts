import { Op } from 'sequelize';
import { type BodyOf } from '@shared/contract/endpoint';
import { type saveFilter as contract } from '@shared/contract/work';
import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { Conflict, NotFound } from '../../http/errors';
import { SavedFilter } from '../../models';
import { presentFilter } from '../../presenters/saved-filter';

/** Own filters, and those that somebody of the same role shares. */
export async function readFilters(actor: Actor, list: string | undefined) {
  const filters = await SavedFilter.findAll({
    where: {
      [Op.or]: [{ personId: actor.id }, { sharedWithRole: actor.role }],
      ...(list ? { list } : {}),
    },
    order: ['list', 'name', 'id'],
  });
  return { items: filters.map((filter) => presentFilter(filter, actor)), next: null };
}

/** Act `filter.save` */
export function saveFilter(actor: Actor, input: BodyOf<typeof contract>) {
  return act(actor, 'filter.save', async (transaction) => {
    const { list, name, query, sharedWithRole } = input;
    const known = await SavedFilter.count({
      where: { personId: actor.id, list, name },
      transaction,
    });
    if (known > 0)
      throw new Conflict('filter.exists', `You have a filter "${name}" already.`, {
        name: 'You have a filter of this name already.',
      });
    const filter = await SavedFilter.create(
      {
        personId: actor.id,
        list,
        name,
        query,
        sharedWithRole: sharedWithRole ? actor.role : null,
      },
      { transaction },
    );
    return {
      result: presentFilter(filter, actor),
      entry: {
        recordType: 'filter',
        recordId: filter.id,
        after: { list, name, query, sharedWithRole: filter.sharedWithRole },
      },
    };
  });
}

/** Act `filter.delete`: only the own ones; a shared one of somebody else is theirs to delete. */
export function deleteFilter(actor: Actor, id: string): Promise<void> {
  return act(actor, 'filter.delete', async (transaction) => {
    const filter = await SavedFilter.findOne({ where: { id, personId: actor.id }, transaction });
    if (!filter) throw new NotFound('This filter');
    const { list, name, query } = filter;
    await filter.destroy({ transaction });
    return {
      result: undefined,
      entry: { recordType: 'filter', recordId: id, before: { list, name, query } },
    };
  });
}
