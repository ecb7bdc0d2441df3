import { type Route } from '../http/route';
import { healthRoutes } from './health';
import { partRoutes } from './parts';
import { receiverRoutes } from './receivers';
import { sessionRoutes } from './session';

/** Every route of the product. tests/api proves that each endpoint of the contract is answered by exactly one. */
export const routes: Route[] = [
  // One line a resource, by name.
  ...healthRoutes,
  ...partRoutes,
  ...receiverRoutes,
  ...sessionRoutes,
];
