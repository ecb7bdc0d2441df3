import { z } from 'zod';
import { endpoint } from './endpoint';
import {
  Id,
  IdParams,
  Instant,
  ListQuery,
  OptionalLongText,
  OptionalShortText,
  ShortText,
  houseRoles,
  listOf,
} from './common';

export const Supplier = z.object({
  id: Id,
  name: z.string(),
  location: z.string(),
  notes: z.string(),
  active: z.boolean(),
  contacts: z.array(
    z.object({
      id: Id,
      name: z.string(),
      email: z.string(),
      state: z.enum(['invited', 'active', 'disabled']),
    }),
  ),
  lotsCount: z.number().int(),
  openHoldsCount: z.number().int(),
  version: z.number().int(),
  createdAt: Instant,
});
export type Supplier = z.infer<typeof Supplier>;

export const SupplierFields = z.object({
  name: ShortText,
  location: OptionalShortText,
  notes: OptionalLongText,
  active: z.boolean().default(true),
});

export const listSuppliers = endpoint({
  method: 'get',
  path: '/api/suppliers',
  roles: houseRoles,
  summary: 'Suppliers',
  query: ListQuery.extend({
    find: z.string().max(200).optional(),
    active: z.enum(['true', 'false']).optional(),
  }),
  answer: listOf(Supplier),
});
export const addSupplier = endpoint({
  method: 'post',
  path: '/api/suppliers',
  roles: ['administrator'],
  summary: 'Add a supplier',
  body: SupplierFields,
  answer: Supplier,
  status: 201,
});
export const readSupplier = endpoint({
  method: 'get',
  path: '/api/suppliers/:id',
  roles: houseRoles,
  summary: 'A supplier',
  params: IdParams,
  answer: Supplier,
});
export const changeSupplier = endpoint({
  method: 'put',
  path: '/api/suppliers/:id',
  roles: ['administrator'],
  summary: 'Change a supplier',
  params: IdParams,
  body: SupplierFields.extend({ version: z.number().int() }),
  answer: Supplier,
});
