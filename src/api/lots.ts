import * as contract from '@shared/contract/lots';
import * as history from '@shared/contract/history';
import { type BodyInput, type QueryInput } from '@shared/contract/endpoint';
import { addressOf, call } from './call';

export type { Lot, LotRow } from '@shared/contract/lots';
export type LotQuery = QueryInput<typeof contract.listLots>;

export const listLots = (query: Partial<LotQuery>, signal?: AbortSignal) =>
  call(contract.listLots, { query, signal });

export const registerLot = (body: BodyInput<typeof contract.registerLot>) =>
  call(contract.registerLot, { body });

export const readLot = (id: string, signal?: AbortSignal) =>
  call(contract.readLot, { params: { id }, signal });

export const changeLot = (id: string, body: BodyInput<typeof contract.changeLot>) =>
  call(contract.changeLot, { params: { id }, body });

export const rejudgeLot = (id: string, body: BodyInput<typeof contract.rejudgeLot>) =>
  call(contract.rejudgeLot, { params: { id }, body });

export const readLotHistory = (id: string, after: string | undefined, signal?: AbortSignal) =>
  call(history.lotHistory, { params: { id }, query: { after, limit: 20 }, signal });

export const readingsCsvAddress = (id: string) =>
  addressOf(contract.exportReadings, { params: { id } });

/** The filtered list as CSV, however many rows it has. */
export const lotsCsvAddress = (query: QueryInput<typeof contract.exportLots>) =>
  addressOf(contract.exportLots, { query });
