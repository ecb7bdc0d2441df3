import * as contract from '@shared/contract/suppliers';
import { route } from '../http/route';
import { addSupplier, changeSupplier } from '../services/suppliers/keep-suppliers';
import { readSupplier, readSuppliers } from '../services/suppliers/read-suppliers';

export const supplierRoutes = [
  route(contract.listSuppliers, ({ query }) => readSuppliers(query)),
  route(contract.addSupplier, async ({ actor, body }) =>
    readSupplier(await addSupplier(actor, body)),
  ),
  route(contract.readSupplier, ({ params }) => readSupplier(params.id)),
  route(contract.changeSupplier, async ({ actor, params, body }) => {
    await changeSupplier(actor, params.id, body);
    return readSupplier(params.id);
  }),
];
