import * as contract from '@shared/contract/work';
import { route } from '../http/route';
import { find } from '../services/work/find';
import { readWork } from '../services/work/read-work';

export const workRoutes = [
  route(contract.readWork, ({ actor }) => readWork(actor)),
  route(contract.find, ({ actor, query }) => find(actor, query.find)),
];
