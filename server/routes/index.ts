import { type Route } from '../http/route';
import { workRoutes } from './work';
import { historyRoutes } from './history';
import { analysisRoutes } from './analysis';
import { benchRoutes } from './benches';
import { dispositionRoutes } from './dispositions';
import { healthRoutes } from './health';
import { holdRoutes } from './holds';
import { lotRoutes } from './lots';
import { mailRoutes } from './mail';
import { partRoutes } from './parts';
import { peopleRoutes } from './people';
import { preferenceRoutes } from './preferences';
import { receiverRoutes } from './receivers';
import { sessionRoutes } from './session';
import { supplierRoutes } from './suppliers';
import { uploadRoutes } from './uploads';

/** Every route of the product. tests/api proves that each endpoint of the contract is answered by exactly one. */
export const routes: Route[] = [
  // One line a resource, by name.
  ...workRoutes,
  ...historyRoutes,
  ...analysisRoutes,
  ...benchRoutes,
  ...dispositionRoutes,
  ...healthRoutes,
  ...holdRoutes,
  ...lotRoutes,
  ...mailRoutes,
  ...partRoutes,
  ...peopleRoutes,
  ...preferenceRoutes,
  ...receiverRoutes,
  ...sessionRoutes,
  ...supplierRoutes,
  ...uploadRoutes,
];
