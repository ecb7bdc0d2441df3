import { type z } from 'zod';
import { type SavedFilter as FilterView } from '@shared/contract/work';
import { type Actor } from '../http/actor';
import { type SavedFilter } from '../models';

export function presentFilter(filter: SavedFilter, actor: Actor): z.output<typeof FilterView> {
  return {
    id: filter.id,
    list: filter.list,
    name: filter.name,
    query: filter.query,
    sharedWithRole: filter.sharedWithRole !== null,
    mine: filter.personId === actor.id,
  };
}
