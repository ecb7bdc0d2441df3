import * as contract from '@shared/contract/suppliers';
import { type BodyInput, type QueryInput } from '@shared/contract/endpoint';
import { call } from './call';

export type { Supplier } from '@shared/contract/suppliers';
export type SupplierQuery = Partial<QueryInput<typeof contract.listSuppliers>>;
export type AddSupplier = BodyInput<typeof contract.addSupplier>;
export type ChangeSupplier = BodyInput<typeof contract.changeSupplier>;

export const listSuppliers = (query: SupplierQuery, signal?: AbortSignal) =>
  call(contract.listSuppliers, { query, signal });

export const readSupplier = (id: string, signal?: AbortSignal) =>
  call(contract.readSupplier, { params: { id }, signal });

export const addSupplier = (body: AddSupplier) => call(contract.addSupplier, { body });

export const changeSupplier = (id: string, body: ChangeSupplier) =>
  call(contract.changeSupplier, { params: { id }, body });
