import { type Route } from '../http/route';

/** Every route of the product. tests/api proves that each endpoint of the contract is answered by exactly one. */
export const routes: Route[] = [];
