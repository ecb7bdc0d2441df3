import * as contract from '@shared/contract/lots';
import { route } from '../http/route';
import { writeLotsCsv } from '../services/lots/export-lots';
import { changeLot } from '../services/lots/change-lot';
import { readLot, readLots } from '../services/lots/read-lot';
import { registerLot } from '../services/lots/register-lot';
import { rejudgeLot } from '../services/lots/rejudge-lot';

export const lotRoutes = [
  route(contract.listLots, ({ actor, query }) => readLots(actor, query)),
  route(contract.exportLots, ({ query, response }) => writeLotsCsv(query, response)),
  route(contract.registerLot, async ({ actor, body }) =>
    readLot(actor, await registerLot(actor, body)),
  ),
  route(contract.readLot, ({ actor, params }) => readLot(actor, params.id)),
  route(contract.changeLot, async ({ actor, params, body }) => {
    await changeLot(actor, params.id, body);
    return readLot(actor, params.id);
  }),
  route(contract.rejudgeLot, async ({ actor, params, body }) => {
    await rejudgeLot(actor, params.id, body);
    return readLot(actor, params.id);
  }),
];
