import * as contract from '@shared/contract/work';
import { route } from '../http/route';
import { deleteFilter, readFilters, saveFilter } from '../services/preferences/saved-filters';
import {
  readTablePreferences,
  setTablePreference,
} from '../services/preferences/table-preferences';

const ok = { ok: true as const };

export const preferenceRoutes = [
  route(contract.readPreferences, ({ actor }) => readTablePreferences(actor)),
  route(contract.setTablePreference, async ({ actor, params, body }) => {
    await setTablePreference(actor, params.table, body.columns);
    return ok;
  }),
  route(contract.listFilters, ({ actor, query }) => readFilters(actor, query.list)),
  route(contract.saveFilter, ({ actor, body }) => saveFilter(actor, body)),
  route(contract.deleteFilter, async ({ actor, params }) => {
    await deleteFilter(actor, params.id);
    return ok;
  }),
];
