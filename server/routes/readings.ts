import * as contract from '@shared/contract/lots';
import { route } from '../http/route';
import { exportReadings } from '../services/readings/export-readings';
import { listReadings } from '../services/readings/list-readings';

export const readingRoutes = [
  route(contract.listReadings, ({ params, query }) => listReadings(params.id, query)),
  route(contract.exportReadings, ({ params, query, response }) =>
    exportReadings(params.id, query, response),
  ),
];
