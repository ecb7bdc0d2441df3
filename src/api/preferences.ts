import * as contract from '@shared/contract/work';
import { type BodyInput } from '@shared/contract/endpoint';
import { type z } from 'zod';
import { call } from './call';

export type SavedFilter = z.infer<typeof contract.SavedFilter>;

export const readPreferences = (signal?: AbortSignal) => call(contract.readPreferences, { signal });

export const setTablePreference = (table: string, columns: string[]) =>
  call(contract.setTablePreference, { params: { table }, body: { columns } });

export const listFilters = (list: string, signal?: AbortSignal) =>
  call(contract.listFilters, { query: { list }, signal });

export const saveFilter = (body: BodyInput<typeof contract.saveFilter>) =>
  call(contract.saveFilter, { body });

export const deleteFilter = (id: string) => call(contract.deleteFilter, { params: { id } });
