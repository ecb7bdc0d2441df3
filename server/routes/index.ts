import { type Route } from '../http/route';
import { analysisRoutes } from './analysis';
import { benchRoutes } from './benches';
import { dispositionRoutes } from './dispositions';
import { healthRoutes } from './health';
import { historyRoutes } from './history';
import { holdRoutes } from './holds';
import { lotRoutes } from './lots';
import { mailRoutes } from './mail';
import { partRoutes } from './parts';
import { peopleRoutes } from './people';
import { preferenceRoutes } from './preferences';
import { readingRoutes } from './readings';
import { receiverRoutes } from './receivers';
import { sessionRoutes } from './session';
import { supplierRoutes } from './suppliers';
import { uploadRoutes } from './uploads';
import { workRoutes } from './work';

/** Every route of the product. tests/api proves that each endpoint of the contract is answered by exactly one. */
export const routes: Route[] = [
  // One line a resource, by name.
  ...analysisRoutes,
  ...benchRoutes,
  ...dispositionRoutes,
  ...healthRoutes,
  ...historyRoutes,
  ...holdRoutes,
  ...lotRoutes,
  ...mailRoutes,
  ...partRoutes,
  ...peopleRoutes,
  ...preferenceRoutes,
  ...readingRoutes,
  ...receiverRoutes,
  ...sessionRoutes,
  ...supplierRoutes,
  ...uploadRoutes,
  ...workRoutes,
];
